using ModelLab.Store.Tests.Setting;
using ModelLab.Store.Vault;

namespace ModelLab.Store.Tests.Vault;

public sealed class OrphanSweepTests
{
    [Fact]
    public async Task A_source_that_no_entry_took_up_goes_after_a_day_and_an_adopted_one_stays()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        await store.Vault.StoreAsync("p", "left", new MemoryStream([1, 2, 3]), TestStore.Cancellation);
        var sweep = store.Get<OrphanSweep>();

        store.Time.Advance(TimeSpan.FromHours(23));
        Assert.Equal(0, await sweep.SweepAsync(atStart: true, TestStore.Cancellation));
        store.Time.Advance(TimeSpan.FromHours(2));
        Assert.Equal(1, await sweep.SweepAsync(atStart: false, TestStore.Cancellation));

        Assert.Equal(SmallProject.SourceId, store.Value("SELECT group_concat(source_id) FROM sources"));
        Assert.Equal(1L, store.Value("SELECT count(*) FROM source_chunks"));
        Assert.Equal(SmallProject.SourceId, Assert.Single(store.Keys.All()).SourceId);
    }

    [Fact]
    public async Task At_start_what_did_not_come_to_its_end_goes_at_once()
    {
        await using var store = await TestStore.StartAsync();
        store.Keys.Create("p", "half");
        store.Sql("INSERT INTO sources (project_id, source_id, sha256, bytes, chunks, received_at, adopted) VALUES ('p', 'half', zeroblob(32), 0, 0, 1772357400000000, 0)");
        store.Sql("INSERT INTO source_chunks (project_id, source_id, chunk, ciphertext) VALUES ('p', 'half', 0, zeroblob(20))");
        var sweep = store.Get<OrphanSweep>();

        Assert.Equal(0, await sweep.SweepAsync(atStart: false, TestStore.Cancellation));
        Assert.Equal(1, await sweep.SweepAsync(atStart: true, TestStore.Cancellation));
        Assert.Equal(0L, store.Value("SELECT (SELECT count(*) FROM sources) + (SELECT count(*) FROM source_chunks)"));
    }

    [Fact]
    public async Task A_key_without_a_source_goes_but_the_record_of_a_destroyed_one_stays()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        store.Keys.Create("p", "alone");
        store.Keys.Destroy(SmallProject.Id, SmallProject.SourceId);

        await store.Get<OrphanSweep>().SweepAsync(atStart: false, TestStore.Cancellation);
        Assert.Equal(2, store.Keys.All().Count);
        await store.Get<OrphanSweep>().SweepAsync(atStart: true, TestStore.Cancellation);
        var left = Assert.Single(store.Keys.All());
        Assert.Equal(SmallProject.SourceId, left.SourceId);
        Assert.NotNull(left.DestroyedAt);
    }
}
