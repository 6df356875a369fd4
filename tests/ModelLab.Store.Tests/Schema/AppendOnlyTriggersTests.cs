using Microsoft.Data.Sqlite;
using ModelLab.Store.Sqlite.Schema;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Schema;

public sealed class AppendOnlyTriggersTests
{
    [Theory]
    [InlineData("UPDATE ledger_entries SET canonical_bytes = x'00' WHERE ledger_id = 'p1' AND number = 1", "ledger entries are never changed")]
    [InlineData("UPDATE ledger_entries SET hash = zeroblob(32)", "ledger entries are never changed")]
    [InlineData("DELETE FROM ledger_entries WHERE number = 10", "ledger entries are never removed")]
    [InlineData("INSERT OR REPLACE INTO ledger_entries (ledger_id, number, canonical_bytes, hash) VALUES ('p1', 1, x'00', zeroblob(32))", "ledger entries are never replaced")]
    [InlineData("UPDATE ledger_heads SET count = 9", "a ledger does not become shorter")]
    [InlineData("UPDATE ledger_heads SET ledger_id = 'p2'", "a ledger does not become shorter")]
    [InlineData("DELETE FROM ledger_heads", "a ledger is never removed")]
    [InlineData("INSERT OR REPLACE INTO ledger_heads (ledger_id, count, last_hash, frontier, generation) VALUES ('p1', 0, zeroblob(32), x'', 0)", "a ledger has one head")]
    [InlineData("UPDATE sealed_parts SET ciphertext = x'00'", "sealed parts are never changed")]
    [InlineData("DELETE FROM sealed_parts", "sealed parts are never removed")]
    [InlineData("REPLACE INTO sealed_parts (ledger_id, entry_number, source_id, nonce, ciphertext) VALUES ('p1', 4, 's1', x'00', x'00')", "sealed parts are never replaced")]
    [InlineData("UPDATE kept_contents SET ciphertext = x'00'", "kept contents are never changed")]
    [InlineData("DELETE FROM kept_contents", "kept contents are never removed")]
    [InlineData("REPLACE INTO kept_contents SELECT project_id, hash, source_id, x'00', x'00' FROM kept_contents", "kept contents are never replaced")]
    [InlineData("UPDATE sources SET adopted = 0", "a source that was taken up is never changed")]
    [InlineData("UPDATE sources SET sha256 = zeroblob(32)", "a source that was taken up is never changed")]
    [InlineData("DELETE FROM sources", "a source that was taken up is never removed")]
    [InlineData("REPLACE INTO sources SELECT project_id, source_id, sha256, bytes, chunks, received_at, 0, NULL FROM sources", "a source that was taken up is never replaced")]
    [InlineData("UPDATE source_chunks SET ciphertext = x'00'", "chunks of a source are never changed")]
    [InlineData("DELETE FROM source_chunks", "chunks of a source that was taken up are never removed")]
    [InlineData("INSERT INTO source_chunks (project_id, source_id, chunk, ciphertext) VALUES ('p1', 's1', 1, x'00')", "nothing is added to a source that was taken up")]
    public async Task The_database_itself_refuses(string sql, string message)
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        var refusal = Assert.Throws<SqliteException>(() => store.Sql(sql));
        Assert.Contains(message, refusal.Message, StringComparison.Ordinal);
        Assert.Empty((await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Problems);
    }

    [Fact]
    public async Task Every_trigger_is_tried_by_these_tests()
    {
        await using var store = await TestStore.StartAsync();
        Assert.Equal(18, AppendOnlyTriggers.Names.Count);
        Assert.Equal(18L, store.Value("SELECT count(*) FROM sqlite_master WHERE type = 'trigger'"));
    }

    [Fact]
    public async Task A_source_that_was_not_taken_up_may_be_removed()
    {
        await using var store = await TestStore.StartAsync();
        await store.Vault.StoreAsync("p", "s", new MemoryStream([1]), TestStore.Cancellation);
        Assert.Equal(1, store.Sql("DELETE FROM source_chunks"));
        Assert.Equal(1, store.Sql("DELETE FROM sources"));
    }

    [Fact]
    public async Task One_that_is_missing_or_says_something_else_is_reported_and_made_anew_at_start()
    {
        var first = await TestStore.StartAsync();
        await first.FillAsync();
        first.Sql("DROP TRIGGER append_only_ledger_entries_update; DROP TRIGGER append_only_sources_delete");
        first.Sql("CREATE TRIGGER append_only_sources_delete BEFORE DELETE ON sources WHEN 0 BEGIN SELECT RAISE(ABORT, 'never'); END");
        Assert.Equal(
            [
                "The trigger append_only_ledger_entries_update, which protects what is append-only, is missing.",
                "The trigger append_only_sources_delete, which protects what is append-only, says something else.",
            ],
            (await first.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Problems);

        await using var store = await first.ReopenAsync();
        await store.StartAgainAsync();
        Assert.Empty((await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Problems);
        Assert.Throws<SqliteException>(() => store.Sql("UPDATE ledger_entries SET hash = zeroblob(32)"));
    }
}
