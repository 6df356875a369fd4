using ModelLab.Ledger;
using ModelLab.Projects;
using ModelLab.Projects.Storage;
using ModelLab.Store.Tests.Setting;
using ModelLab.Store.Vault;

namespace ModelLab.Store.Tests.Vault;

public sealed class SealedPartTests
{
    [Fact]
    public async Task A_sealed_part_opens_to_its_content()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        var content = await store.Vault.UnsealAsync(SmallProject.Id, 4, TestStore.Cancellation);
        Assert.Equal("catch.csv", content!["fileName"]!.GetValue<string>());
        Assert.Equal([1.5, -2e-300, 0.1], content["ranges"]!.AsArray().Select(n => n!.GetValue<double>()));
    }

    [Fact]
    public async Task An_entry_without_one_gives_null_and_a_missing_entry_is_said_to_be_missing()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        Assert.Null(await store.Vault.UnsealAsync(SmallProject.Id, 1, TestStore.Cancellation));
        var refusal = await Assert.ThrowsAsync<RefusedException>(() => store.Vault.UnsealAsync(SmallProject.Id, 99, TestStore.Cancellation));
        Assert.Equal(RefusalKind.NotFound, refusal.Kind);
    }

    [Theory]
    [InlineData("DELETE FROM sealed_parts WHERE entry_number = 4")]
    [InlineData("UPDATE sealed_parts SET ciphertext = (SELECT ciphertext FROM sealed_parts WHERE entry_number = 5), nonce = (SELECT nonce FROM sealed_parts WHERE entry_number = 5) WHERE entry_number = 4")]
    [InlineData("UPDATE sealed_parts SET ciphertext = substr(ciphertext, 1, 10) WHERE entry_number = 4")]
    [InlineData("UPDATE sealed_parts SET nonce = zeroblob(12) WHERE entry_number = 4")]
    [InlineData("UPDATE sealed_parts SET nonce = zeroblob(3) WHERE entry_number = 4")]
    public async Task A_part_removed_moved_or_changed_from_outside_is_found(string change)
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        store.SqlWithoutTriggers(change);
        var refusal = await Assert.ThrowsAsync<RefusedException>(() => store.Vault.UnsealAsync(SmallProject.Id, 4, TestStore.Cancellation));
        Assert.Equal(RefusalKind.Conflict, refusal.Kind);
    }

    [Fact]
    public async Task Kept_content_is_found_by_its_hash_and_kept_once()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        byte[] rows = [1, 0, 0, 0, 2, 0, 0, 0];
        var kept = new KeptContent(Sha256Hash.Of(rows), SmallProject.SourceId, rows);
        await store.Projects.CommitAsync(new EntryBatch(SmallProject.Id, [SmallProject.Comment("c9")], _ => { }, [kept, kept]), TestStore.Cancellation);

        Assert.Equal(rows, await store.Vault.ReadContentAsync(SmallProject.Id, kept.Hash, TestStore.Cancellation));
        Assert.Equal(1L, store.Value("SELECT count(*) FROM kept_contents"));
        var other = await Assert.ThrowsAsync<RefusedException>(() => store.Vault.ReadContentAsync("p2", kept.Hash, TestStore.Cancellation));
        Assert.Equal(RefusalKind.NotFound, other.Kind);
    }

    [Fact]
    public async Task Kept_content_changed_from_outside_is_found_and_one_with_a_wrong_hash_is_not_taken()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        await Assert.ThrowsAsync<ArgumentException>(() => store.Projects.CommitAsync(
            new EntryBatch(SmallProject.Id, [SmallProject.Comment("c9")], _ => { }, [new KeptContent(Sha256Hash.Of([1]), SmallProject.SourceId, [2])]), TestStore.Cancellation));
        store.SqlWithoutTriggers("UPDATE kept_contents SET nonce = zeroblob(12)");
        await Assert.ThrowsAsync<VaultDamagedException>(
            () => store.Vault.ReadContentAsync(SmallProject.Id, Sha256Hash.Of([1, 0, 0, 0, 2, 0, 0, 0]), TestStore.Cancellation));
    }
}
