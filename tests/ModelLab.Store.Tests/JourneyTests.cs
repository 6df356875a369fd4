using System.Text;
using ModelLab.Intake.Csv;
using ModelLab.Projects.Comments;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Opening;
using ModelLab.Projects.Paths;
using ModelLab.Projects.People;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Sources;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Selection;
using ModelLab.Store.Server;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests;

/// <summary>
/// The use cases themselves on the real store: what they record is read back by a second process, replays bit for bit, and
/// gives the same read model again. Data: Palmer penguins (Gorman, Williams and Fraser 2014; CC0).
/// </summary>
public sealed class JourneyTests
{
    [Fact]
    public async Task A_whole_project_survives_a_restart_and_its_read_model_follows_from_its_ledger()
    {
        var first = await TestStore.StartAsync();
        var owner = await EnrolAsync(first, "Ada Anker", "ada@example.org");
        await EnrolAsync(first, "Ben Bode", "ben@example.org");
        var project = await WorkAsync(first, owner);

        await using var store = await first.ReopenAsync();
        await store.StartAgainAsync();
        var check = await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation);
        Assert.Empty(check.Problems);
        Assert.Equal((2, 2), (check.Ledgers, check.Sources));
        foreach (var collection in ReadModelCollections.Names.Values)
        {
            Assert.True((long)store.Value($"SELECT count(*) FROM documents WHERE collection = '{collection}'")! > 0, $"The journey makes no {collection}.");
        }

        var path = (await store.Get<ReadRevision>().PathsAsync(owner, project, TestStore.Cancellation)).Single(p => p.Name == "main");
        var revisions = (await store.Get<ReadRevision>().PathAsync(owner, project, path.Id, TestStore.Cancellation)).Revisions;
        Assert.Equal(333, revisions[0].N);
        var rows = await store.Get<ReadRevision>().RowsAsync(owner, project, revisions[^1].Id!, TestStore.Cancellation);
        Assert.Equal(revisions[^1].N, rows.RowNumbers.Count);

        var replay = await store.Get<ReplayProject>().ExecuteAsync(owner, project, TestStore.Cancellation);
        Assert.True(replay.Ok);
        Assert.Equal(revisions.Count + 1, replay.Revisions.Count);
        Assert.All(replay.Revisions, r => Assert.Equal(0, r.LargestRelativeDifference));
    }

    private static async Task<string> WorkAsync(TestStore store, Caller owner)
    {
        var project = (await store.Get<OpenProject>().ExecuteAsync(owner, "Penguins", "What does body mass go with?", TestStore.Cancellation)).Id;
        var ben = await store.Get<ManageMembers>().AddAsync(owner, project, "ben@example.org", Role.Reviewer, "reviews", TestStore.Cancellation);
        await store.Get<ManageMembers>().ChangeRoleAsync(owner, project, ben.Id, Role.Analyst, "fits too", TestStore.Cancellation);
        await store.Get<ManageMembers>().RemoveAsync(owner, project, ben.Id, "moved on", TestStore.Cancellation);

        var source = await store.Get<ReceiveSource>().ExecuteAsync(
            owner, project, new SourceRequest("penguins.csv", new CsvOptions(), false, null, "the file of the study"), Penguins(), TestStore.Cancellation);
        await store.Get<DescribeVariable>().ExecuteAsync(
            owner, project, source.Dataset.Id, "island", new VariableChange(null, null, null, null, "Dream", null, "most rows"), TestStore.Cancellation);
        var path = await store.Get<StartPath>().ExecuteAsync(
            owner, project,
            new StartRequest(
                "main", source.Dataset.Id, null, "body_mass_g", [.. Terms("beak_length_mm", "beak_depth_mm", "flipper_length_mm", "species", "island", "sex")],
                null, null, new RuleRecord(ChoosingDirection.Backward, Criterion.P, 0.05), null, null, null, null, "all candidates first"),
            TestStore.Cancellation);
        var full = (await store.Get<ReadRevision>().PathAsync(owner, project, path, TestStore.Cancellation)).Revisions[0];
        var without = await store.Get<TakeDecision>().ExecuteAsync(
            owner, project, path, new DecisionRequest(DecisionKind.ExcludeRows, null, [1, 2], ExclusionCause.RecordingError, null, "checked on paper", full.Id), false, TestStore.Cancellation);
        await store.Get<ChooseByRule>().ExecuteAsync(owner, project, path, new ChooseRequest("the rule of the plan", without.Id), false, TestStore.Cancellation);
        await store.Get<MakePreparation>().ExecuteAsync(
            owner, project,
            new PreparationRequest(source.Dataset.Id, null, [new StepRequest(StepKind.CompleteCases, "as planned", Variables: ["sex", "species"])]),
            false, TestStore.Cancellation);

        await TiedPathAsync(store, owner, project);

        var comment = await store.Get<ManageComments>().MakeAsync(owner, project, new Place("revision", full.Id!, null), "Is the beak still needed?", TestStore.Cancellation);
        await store.Get<ManageComments>().ReplyAsync(owner, project, comment.Id, "It is.", TestStore.Cancellation);
        await store.Get<ManageComments>().SettleAsync(owner, project, comment.Id, "Looked at.", TestStore.Cancellation);
        foreach (var finding in await store.Get<ManageFindings>().AllAsync(owner, project, TestStore.Cancellation))
        {
            if (finding.State == FindingState.Open)
            {
                await store.Get<ManageFindings>().AcceptAsync(owner, project, finding.Id, "Known.", TestStore.Cancellation);
            }
        }

        return project;
    }

    /// <summary>Two measures of size that say nearly the same, so that a finding is raised.</summary>
    private static async Task TiedPathAsync(TestStore store, Caller owner, string project)
    {
        var rows = string.Join('\n', Enumerable.Range(1, 30).Select(i => $"{100 + (i * 7 % 13)}.5,{i}.25,{(2 * i) + (i % 3)}.75,{i * 11 % 17}.5"));
        var source = await store.Get<ReceiveSource>().ExecuteAsync(
            owner, project, new SourceRequest("sizes.csv", new CsvOptions(), false, null, "a second file"),
            new MemoryStream(Encoding.UTF8.GetBytes("saved,area,volume,age\n" + rows + "\n")), TestStore.Cancellation);
        await store.Get<StartPath>().ExecuteAsync(
            owner, project,
            new StartRequest("sizes", source.Dataset.Id, null, "saved", [.. Terms("area", "volume", "age")], null, null, null, null, null, null, null, "all candidates first"),
            TestStore.Cancellation);
    }

    private static IEnumerable<Term> Terms(params string[] names) => names.Select(n => new VariableTerm(n));

    private static Stream Penguins() =>
        typeof(JourneyTests).Assembly.GetManifestResourceStream("penguins.csv") ?? throw new InvalidOperationException("The fixture penguins.csv is not built in.");

    private static async Task<Caller> EnrolAsync(TestStore store, string name, string email) =>
        new((await store.Get<ServerRecords>().EnrolAsync(ServerRecords.CommandLineActor, name, email, false, TestStore.Cancellation)).Person.Id);
}
