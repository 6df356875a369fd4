using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Upkeep;

public sealed class StoreCheckTests
{
    [Fact]
    public async Task A_sound_store_passes_and_is_counted()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        var check = await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation);
        Assert.Empty(check.Problems);
        Assert.True(check.Ok);
        Assert.Equal((1, 10L, 1, 0, 2, 1), (check.Ledgers, check.Entries, check.Sources, check.Withdrawn, check.SealedParts, check.Contents));
    }

    [Theory]
    [InlineData("UPDATE ledger_entries SET canonical_bytes = CAST(replace(CAST(canonical_bytes AS TEXT), 'Look at row 4.', 'Look at row 5.') AS BLOB) WHERE number = 7", "Ledger p1")]
    [InlineData("UPDATE ledger_entries SET canonical_bytes = x'7b7d' WHERE number = 7", "Ledger p1")]
    [InlineData("UPDATE ledger_entries SET hash = zeroblob(32) WHERE number = 7", "Ledger p1, entry 7: the hash beside the entry is not the entry's.")]
    [InlineData("PRAGMA foreign_keys=OFF; DELETE FROM ledger_entries WHERE number = 10", "Ledger p1")]
    [InlineData("PRAGMA foreign_keys=OFF; DELETE FROM ledger_entries WHERE number = 6", "Ledger p1")]
    [InlineData("UPDATE ledger_heads SET last_hash = zeroblob(32)", "Ledger p1")]
    [InlineData("DELETE FROM ledger_heads", "Ledger p1 has entries but no head.")]
    [InlineData("UPDATE documents SET json = '{}' WHERE id = 'c1'", "Project p1, comment c1: the stored document differs")]
    [InlineData("UPDATE source_chunks SET ciphertext = zeroblob(60)", "Project p1, source s1: Chunk 0 of source s1 is not what was stored.")]
    [InlineData("UPDATE sources SET sha256 = zeroblob(32)", "Project p1, source s1: its bytes do not give the SHA-256")]
    [InlineData("UPDATE sealed_parts SET ciphertext = zeroblob(60) WHERE entry_number = 5", "Project p1, sealed part of entry 5:")]
    [InlineData("UPDATE kept_contents SET ciphertext = zeroblob(60)", "Project p1, kept content ")]
    [InlineData("PRAGMA foreign_keys=OFF; DELETE FROM sources", "Table source_chunks: a row refers to one that does not exist.")]
    public async Task What_was_changed_from_outside_is_named(string change, string problem)
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        store.SqlWithoutTriggers(change);
        var check = await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation);
        Assert.False(check.Ok);
        Assert.Contains(check.Problems, p => p.StartsWith(problem, StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_lost_key_is_a_problem_and_a_destroyed_one_is_not()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        store.Keys.Forget(SmallProject.Id, SmallProject.SourceId);
        var check = await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation);
        Assert.Contains("Project p1, source s1: its key is missing, and nobody destroyed it. Restore the backup of the keys.", check.Problems);
    }
}
