using ModelLab.Projects.Views;
using ModelLab.Store.Tests.Setting;
using ModelLab.Store.Upkeep;

namespace ModelLab.Store.Tests.Documents;

public sealed class ReadModelRebuildTests
{
    [Fact]
    public async Task Documents_formed_from_the_ledger_are_those_stored()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        Assert.Equal(["p1"], await store.Get<ReadModelRebuild>().LedgersAsync(TestStore.Cancellation));
        Assert.Empty(await store.Get<ReadModelRebuild>().CompareAsync(SmallProject.Id, TestStore.Cancellation));
        Assert.Equal(11L, store.Value("SELECT count(*) FROM documents"));
    }

    [Fact]
    public async Task They_are_the_same_when_every_entry_was_written_by_a_process_that_had_read_nothing_yet()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        for (var i = 0; i < 3; i++)
        {
            await using var other = TestStore.Unstarted(store.Folder, removes: false);
            await other.CommitAsync(SmallProject.Comment($"x{i}"), SmallProject.Draft(new Projects.Entries.CommentSettled($"x{i}"), "Done."));
        }

        Assert.Empty(await store.Get<ReadModelRebuild>().CompareAsync(SmallProject.Id, TestStore.Cancellation));
    }

    [Theory]
    [InlineData("UPDATE documents SET json = replace(json, 'row 4', 'row 5') WHERE id = 'c1'", "comment c1: the stored document differs from what the ledger gives.")]
    [InlineData("DELETE FROM documents WHERE id = 'c1'", "comment c1: the ledger gives it, but it is not stored.")]
    [InlineData("INSERT INTO documents VALUES ('p1', 'comment', 'c7', 7, '{}')", "comment c7: stored, but no entry of the ledger made it.")]
    [InlineData("UPDATE documents SET position = 9 WHERE id = 'c1'", "comment c1: stored at place 9; the ledger gives 0.")]
    public async Task A_difference_is_named_and_replacing_puts_it_right_also_in_memory(string change, string expected)
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        var before = await store.Projects.ReadAsync(SmallProject.Id, m => m.All<CommentView>(), TestStore.Cancellation);
        Assert.Equal(1, store.Sql(change));
        await using var other = TestStore.Unstarted(store.Folder, removes: false);
        await other.Projects.ReadAsync(SmallProject.Id, m => m.Find<ProjectView>(SmallProject.Id), TestStore.Cancellation);

        var rebuild = store.Get<ReadModelRebuild>();
        Assert.Equal("Project p1, " + expected, Assert.Single(await rebuild.CompareAsync(SmallProject.Id, TestStore.Cancellation)));
        Assert.Equal(11, await rebuild.ReplaceAsync(SmallProject.Id, TestStore.Cancellation));
        Assert.Empty(await rebuild.CompareAsync(SmallProject.Id, TestStore.Cancellation));
        Assert.Equal(before, await other.Projects.ReadAsync(SmallProject.Id, m => m.All<CommentView>(), TestStore.Cancellation));
    }

    [Fact]
    public async Task Documents_of_another_version_are_formed_anew_at_start()
    {
        var first = await TestStore.StartAsync();
        await first.FillAsync();
        first.Sql("UPDATE documents SET json = '{}'; UPDATE store_facts SET value = '0' WHERE name = 'read-model-version'");
        await using var store = await first.ReopenAsync();
        await store.StartAgainAsync();
        Assert.Empty(await store.Get<ReadModelRebuild>().CompareAsync(SmallProject.Id, TestStore.Cancellation));
        Assert.Equal("1", store.Value("SELECT value FROM store_facts WHERE name = 'read-model-version'"));
    }
}
