using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Verification;
using ModelLab.Projects;
using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Store.Tests.Setting;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Tests.Ledgers;

public sealed class CommitTests
{
    [Fact]
    public async Task Entries_head_and_read_model_appear_together()
    {
        await using var store = await TestStore.StartAsync();
        var batch = await store.CommitAsync(SmallProject.Opened(), SmallProject.Comment("c1"));

        Assert.Equal([1L, 2L], batch.Entries.Select(e => e.Number));
        Assert.Equal(batch.Head, await store.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation));
        var read = await store.Projects.ReadAsync(
            SmallProject.Id, m => (Project: m.Find<ProjectView>(SmallProject.Id), Comments: m.All<CommentView>()), TestStore.Cancellation);
        Assert.Equal("Catch and effort", read.Project!.Name);
        Assert.Equal("c1", Assert.Single(read.Comments).Id);
    }

    [Fact]
    public async Task Stored_bytes_are_those_that_were_hashed_and_verify_against_the_head()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        var verifier = new LedgerVerifier(SmallProject.Id);
        await foreach (var bytes in store.Projects.EntriesAsync(SmallProject.Id, 1, TestStore.Cancellation))
        {
            verifier.Add(bytes);
        }

        var result = verifier.Finish(await store.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation));
        Assert.True(result.Ok, result.Problem);
        Assert.Equal(10, result.Entries);
    }

    [Fact]
    public async Task Entries_are_given_from_a_number_on_across_pages()
    {
        await using var store = await TestStore.StartAsync();
        await store.CommitAsync([SmallProject.Opened(), .. Enumerable.Range(2, 299).Select(i => SmallProject.Comment($"c{i}"))]);
        var numbers = new List<long>();
        await foreach (var bytes in store.Projects.EntriesAsync(SmallProject.Id, 3, TestStore.Cancellation))
        {
            numbers.Add(LedgerEntry.Parse(bytes).Number);
        }

        Assert.Equal(Enumerable.Range(3, 298).Select(i => (long)i), numbers);
    }

    [Fact]
    public async Task One_entry_is_found_and_a_missing_one_is_said_to_be_missing()
    {
        await using var store = await TestStore.StartAsync();
        await store.CommitAsync(SmallProject.Opened());
        Assert.Equal("project-opened/1", (await store.Projects.EntryAsync(SmallProject.Id, 1, TestStore.Cancellation)).Kind);
        var refusal = await Assert.ThrowsAsync<RefusedException>(() => store.Projects.EntryAsync(SmallProject.Id, 2, TestStore.Cancellation));
        Assert.Equal(RefusalKind.NotFound, refusal.Kind);
    }

    [Fact]
    public async Task A_guard_that_refuses_leaves_nothing()
    {
        await using var store = await TestStore.StartAsync();
        await store.CommitAsync(SmallProject.Opened());
        var refusal = await Assert.ThrowsAsync<RefusedException>(() => store.Projects.CommitAsync(
            new EntryBatch(SmallProject.Id, [SmallProject.Comment("c1")], _ => throw RefusedException.Invalid("Not now.")), TestStore.Cancellation));

        Assert.Equal("Not now.", refusal.Message);
        Assert.Equal(1, (await store.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation)).Count);
        Assert.Equal(1L, store.Value("SELECT count(*) FROM ledger_entries WHERE ledger_id = 'p1'"));
        Assert.Empty(await store.Projects.ReadAsync(SmallProject.Id, m => m.All<CommentView>(), TestStore.Cancellation));
    }

    [Theory]
    [InlineData("ledger_entries", "NEW.number = 3")]
    [InlineData("sealed_parts", "1")]
    [InlineData("documents", "NEW.collection = 'comment'")]
    [InlineData("kept_contents", "1")]
    [InlineData("ledger_heads", "1")]
    public async Task A_failure_at_any_table_leaves_nothing(string table, string when)
    {
        await using var store = await TestStore.StartAsync();
        var source = await store.Vault.StoreAsync(SmallProject.Id, SmallProject.SourceId, new MemoryStream(SmallProject.Table), TestStore.Cancellation);
        byte[] rows = [7];
        var batch = new EntryBatch(
            SmallProject.Id, [SmallProject.Opened(), SmallProject.Received(source), SmallProject.Comment("c1"), SmallProject.Comment("c2")], _ => { },
            [new KeptContent(ModelLab.Ledger.Sha256Hash.Of(rows), SmallProject.SourceId, rows)], [SmallProject.SourceId]);
        store.Sql($"CREATE TRIGGER injected BEFORE INSERT ON {table} WHEN {when} BEGIN SELECT RAISE(ABORT, 'injected'); END");

        await Assert.ThrowsAnyAsync<Exception>(() => store.Projects.CommitAsync(batch, TestStore.Cancellation));

        foreach (var each in (string[])["ledger_entries", "sealed_parts", "documents", "kept_contents", "ledger_heads"])
        {
            Assert.Equal(0L, store.Value($"SELECT count(*) FROM {each}"));
        }

        Assert.Equal(0L, store.Value("SELECT adopted FROM sources"));
        store.Sql("DROP TRIGGER injected");
        Assert.Equal(4, (await store.Projects.CommitAsync(batch, TestStore.Cancellation)).Head.Count);
        Assert.Equal(2, await store.Projects.ReadAsync(SmallProject.Id, m => m.All<CommentView>().Count, TestStore.Cancellation));
    }

    [Fact]
    public async Task Guards_of_concurrent_writers_see_each_other_and_numbers_have_no_gap()
    {
        await using var store = await TestStore.StartAsync();
        await store.CommitAsync(SmallProject.Opened());
        var seen = new List<int>();
        await Task.WhenAll(Enumerable.Range(0, 40).Select(i => Task.Run(() => store.Projects.CommitAsync(
            new EntryBatch(SmallProject.Id, [SmallProject.Comment($"c{i}"), SmallProject.Comment($"c{i}-reply", replyTo: $"c{i}")], m => seen.Add(m.All<CommentView>().Count)),
            TestStore.Cancellation))));

        Assert.Equal(Enumerable.Range(0, 40).Select(i => 2 * i), seen);
        Assert.Equal(81, (await store.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation)).Count);
        Assert.Equal(81L, store.Value("SELECT max(number) FROM ledger_entries WHERE ledger_id = 'p1'"));
        Assert.Equal(81L, store.Value("SELECT count(*) FROM ledger_entries WHERE ledger_id = 'p1'"));
    }

    [Fact]
    public async Task Two_processes_on_one_database_do_not_lose_each_others_entries()
    {
        await using var first = await TestStore.StartAsync();
        await using var second = TestStore.Unstarted(first.Folder, removes: false);
        await first.CommitAsync(SmallProject.Opened());
        await Task.WhenAll(Enumerable.Range(0, 20).Select(i => (i % 2 == 0 ? first : second).CommitAsync(SmallProject.Comment($"c{i}"))));

        Assert.Equal(21, (await first.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation)).Count);
        Assert.Equal(20, await first.Projects.ReadAsync(SmallProject.Id, m => m.All<CommentView>().Count, TestStore.Cancellation));
        Assert.Equal(20, await second.Projects.ReadAsync(SmallProject.Id, m => m.All<CommentView>().Count, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_source_is_adopted_once_and_only_if_it_came_to_its_end()
    {
        await using var store = await TestStore.StartAsync();
        var unknown = await Assert.ThrowsAsync<RefusedException>(() => store.Projects.CommitAsync(
            new EntryBatch(SmallProject.Id, [SmallProject.Opened()], _ => { }, AdoptedSources: ["nowhere"]), TestStore.Cancellation));
        Assert.Equal(RefusalKind.NotFound, unknown.Kind);

        await store.FillAsync();
        var again = await Assert.ThrowsAsync<RefusedException>(() => store.Projects.CommitAsync(
            new EntryBatch(SmallProject.Id, [SmallProject.Comment("c9")], _ => { }, AdoptedSources: [SmallProject.SourceId]), TestStore.Cancellation));
        Assert.Equal(RefusalKind.Conflict, again.Kind);
    }

    [Fact]
    public async Task A_batch_without_entries_and_the_ledger_of_the_server_are_refused()
    {
        await using var store = await TestStore.StartAsync();
        await Assert.ThrowsAsync<ArgumentException>(() => store.CommitAsync());
        await Assert.ThrowsAsync<ArgumentException>(() => store.Projects.CommitAsync(
            new EntryBatch("server", [SmallProject.Opened()], _ => { }), TestStore.Cancellation));
    }

    [Fact]
    public async Task A_person_sees_the_projects_of_present_membership_oldest_first()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        var later = EntryKinds.Draft(new ProjectOpened("Later", "?"), SmallProject.At.AddDays(1), SmallProject.Analyst, null);
        var earlier = EntryKinds.Draft(new ProjectOpened("Earlier", "?"), SmallProject.At.AddDays(-1), SmallProject.Analyst, null);
        await store.Projects.CommitAsync(new EntryBatch("p2", [later], _ => { }), TestStore.Cancellation);
        await store.Projects.CommitAsync(
            new EntryBatch("p3", [earlier, SmallProject.Draft(new MemberJoined("ben", "Ben Bode", Role.Reader))], _ => { }), TestStore.Cancellation);

        Assert.Equal(["p3", SmallProject.Id, "p2"], (await store.Projects.ProjectsOfAsync("ada", TestStore.Cancellation)).Select(p => p.Id));
        Assert.Equal(["p3", SmallProject.Id], (await store.Projects.ProjectsOfAsync("ben", TestStore.Cancellation)).Select(p => p.Id));
        Assert.Empty(await store.Projects.ProjectsOfAsync("cem", TestStore.Cancellation));
        Assert.Empty(await store.Projects.ProjectsOfAsync("nobody", TestStore.Cancellation));
    }

    [Fact]
    public async Task A_reader_sees_one_state_while_another_writes()
    {
        await using var store = await TestStore.StartAsync();
        await using var other = TestStore.Unstarted(store.Folder, removes: false);
        await store.CommitAsync(SmallProject.Opened(), SmallProject.Comment("c1"));

        // The second process has nothing in memory: each collection is read from the database when it is first asked for.
        var read = await other.Projects.ReadAsync(
            SmallProject.Id,
            m =>
            {
                var project = m.Find<ProjectView>(SmallProject.Id);
                Task.Run(() => store.CommitAsync(SmallProject.Comment("c2"))).Wait(TestStore.Cancellation);
                return (project, m.All<CommentView>().Count);
            },
            TestStore.Cancellation);
        Assert.NotNull(read.project);
        Assert.Equal(1, read.Count);
        Assert.Equal(2, await other.Projects.ReadAsync(SmallProject.Id, m => m.All<CommentView>().Count, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_write_withdrawn_before_its_turn_does_nothing()
    {
        await using var store = await TestStore.StartAsync();
        using var withdrawn = new CancellationTokenSource();
        await withdrawn.CancelAsync();
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => store.Get<StoreWriter>().WriteAsync(
            _ => Task.FromException<int>(new InvalidOperationException("It ran.")), withdrawn.Token));
    }
}
