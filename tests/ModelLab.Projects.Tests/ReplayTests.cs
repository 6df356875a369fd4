using System.Text;
using System.Text.Json.Nodes;
using ModelLab.Intake;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Records;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Tests.Hosting;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Tests;

/// <summary>What a replay notices. Every forgery is hashed anew, so that the chain alone would not tell.</summary>
public sealed class ReplayTests : IDisposable
{
    // Two measures of size tied at r 0.99, codes in a number, gaps in age.
    private static readonly string Table = "saved,area,volume,age,tenure_code,heat\n" + string.Join('\n', Enumerable.Range(1, 40).Select(i =>
        $"{100 + (i * 7 % 13)}.5,{i}.25,{(2 * i) + (i % 3)}.75,{(i % 9 == 0 ? string.Empty : $"{i * 11 % 17}.5")},{1 + (i % 4)},{(i % 3) switch { 0 => "gas", 1 => "oil", _ => "wood" }}")) + "\n";

    private readonly Bench bench = new();
    private string source = string.Empty;
    private RevisionReading last = null!;

    public static TheoryData<string, string, string> Forgeries => new()
    {
        { "revision/1", "figures.fit.rSquared", "figures differ" },
        { "revision/1", "figures.coefficients.0.estimate", "figures differ" },
        { "revision/1", "decision.evidence.p", "figures of the term removed" },
        { "revision/1", "decision.evidence.aicChange", "figures of the term removed" },
        { "revision/1", "decision.ruleSays", "rule says something else" },
        { "revision/1", "rows.losses.0.missing", "missing values cost" },
        { "revision/1", "rows.count", "rows analysed" },
        { "revision/1", "rows.hash", "rows analysed" },
        { "revision/1", "fingerprint", "depend on" },
        { "revision/1", "number", "number" },
        { "revision/1", "fullModelMeanSquare", "figures differ" },
        { "preparation-made/1", "steps.0.rowsAfter", "Step s1" },
        { "preparation-made/1", "steps.0.rowsBefore", "Step s1" },
        { "preparation-made/1", "steps.1.cells", "Step s2" },
        { "preparation-made/1", "steps.2.losses.0.alone", "other losses" },
        { "finding-raised/1", "finding.text", "findings recorded" },
        { "dataset-read/1", "rows", "rows" },
        { "dataset-read/1", "variables.3.missing", "'age'" },
        { "dataset-read/1", "variables.4.distinct", "'tenure_code'" },
        { "variable-described/1", "state.missing", "'tenure_code'" },
        { "source-received/1", "bytes", "not those that were received" },
    };

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task What_nobody_touched_is_equal_to_the_last_bit()
    {
        var project = await ProjectAsync();
        var replay = await ReplayAsync(project);
        Assert.Empty(Told(replay));
        Assert.True(replay.Ok);
        Assert.All(replay.Revisions, r => Assert.True(r.Equal));
        Assert.Equal(Recorded(project, "source-received/1"), replay.Sources.Count);
        Assert.Equal(Recorded(project, "dataset-read/1"), replay.Datasets.Count);
        Assert.Equal(Recorded(project, "preparation-made/1"), replay.Preparations.Count);
        Assert.Equal(Recorded(project, "revision/1"), replay.Revisions.Count);
        Assert.True(replay.Revisions.Count > 2);
    }

    [Theory]
    [MemberData(nameof(Forgeries))]
    public async Task A_forged_entry_that_is_hashed_anew_is_noticed(string kind, string member, string says)
    {
        var project = await ProjectAsync();
        Forgery.OfLast(bench.Store, project, kind, body => Change(body, member.Split('.')));
        Assert.True((await bench.Get<ReadLedger>().VerifyAsync(Bench.Analyst, project, Bench.Stop)).Ok);
        var replay = await ReplayAsync(project);
        Assert.False(replay.Ok);
        Assert.Contains(Told(replay), p => p.Contains(says, StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_changed_byte_of_the_source_is_noticed_where_it_matters()
    {
        var project = await ProjectAsync();
        var bytes = Encoding.UTF8.GetBytes(Table);
        var at = Table.IndexOf("1.25", StringComparison.Ordinal);
        bytes[at] = (byte)'7';
        bench.Store.ReplaceSource(source, bytes);
        var replay = await ReplayAsync(project);
        Assert.False(replay.Ok);
        Assert.False(Assert.Single(replay.Sources).Equal);
        Assert.All(replay.Revisions, r => Assert.Contains(r.Problems, p => p.Contains("figures differ", StringComparison.Ordinal)));
    }

    [Fact]
    public async Task A_source_that_no_longer_reads_is_told_and_the_replay_goes_on()
    {
        var project = await ProjectAsync();
        bench.Store.ReplaceSource(source, Encoding.UTF8.GetBytes(Table.Replace("1.25", "x", StringComparison.Ordinal)));
        var replay = await ReplayAsync(project);
        Assert.False(replay.Ok);
        Assert.Equal(Recorded(project, "revision/1"), replay.Revisions.Count);
        Assert.All(replay.Revisions, r => Assert.NotEmpty(r.Problems));
    }

    [Fact]
    public async Task A_withdrawn_source_is_told()
    {
        var project = await ProjectAsync();
        await bench.Store.DiscardAsync(project, source, Bench.Stop);
        var replay = await ReplayAsync(project);
        Assert.False(replay.Ok);
        Assert.Contains("withdrawn", Assert.Single(replay.Sources).Problem, StringComparison.Ordinal);
        Assert.All(replay.Revisions, r => Assert.Contains(r.Problems, p => p.Contains("withdrawn", StringComparison.Ordinal)));
    }

    [Fact]
    public async Task Kept_rows_that_were_exchanged_are_noticed()
    {
        var project = await ProjectAsync();
        bench.Store.ReplaceContent(project, last.Rows.Hash, [1, 1, 1]);
        Assert.Contains(Told(await ReplayAsync(project)), p => p.Contains("list of rows", StringComparison.Ordinal));
    }

    [Fact]
    public async Task Sealed_columns_that_were_exchanged_are_noticed()
    {
        var project = await ProjectAsync();
        var dataset = bench.Store.Model(project).All<Views.DatasetView>()[0];
        bench.Store.SealedPart(project, dataset.EntryNumber)["columns"]!.AsArray()[1]!.AsObject()["maximum"] = 900;
        Assert.Contains(Told(await ReplayAsync(project)), p => p.Contains("'area'", StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_removal_of_another_term_than_recorded_is_noticed()
    {
        var project = await ProjectAsync();
        Forgery.OfLast(bench.Store, project, "revision/1", body => body["decision"]!["term"] = new JsonObject { ["variable"] = "area" });
        Assert.Contains(Told(await ReplayAsync(project)), p => p.Contains("terms of the model", StringComparison.Ordinal));
    }

    [Fact]
    public async Task An_entry_that_cannot_be_read_is_told()
    {
        var project = await ProjectAsync();
        Forgery.OfLast(bench.Store, project, "finding-raised/1", body => body["finding"] = 7);
        var replay = await ReplayAsync(project);
        Assert.False(replay.Ok);
        Assert.Contains(replay.Problems, p => p.Contains("cannot be read", StringComparison.Ordinal));
    }

    private static List<string> Told(ReplayResult replay) =>
    [
        .. replay.Problems, .. replay.Sources.Select(s => s.Problem).OfType<string>(), .. replay.Datasets.SelectMany(d => d.Problems),
        .. replay.Preparations.SelectMany(p => p.Problems), .. replay.Revisions.SelectMany(r => r.Problems),
    ];

    // One more, one letter more, another hash: whatever stands there is no longer what it was.
    private static void Change(JsonNode node, ReadOnlySpan<string> path)
    {
        var parent = node;
        foreach (var step in path[..^1])
        {
            parent = parent is JsonArray list ? list[int.Parse(step, null)]! : parent[step]!;
        }

        var member = path[^1];
        var old = parent[member]!.AsValue();
        parent[member] = old.GetValueKind() == System.Text.Json.JsonValueKind.Number ? JsonValue.Create(old.GetValue<double>() + 1)
            : member is "hash" or "fingerprint" ? JsonValue.Create(new string('7', 64))
            : JsonValue.Create(old.GetValue<string>() + "!");
    }

    private int Recorded(string project, string kind) => bench.Store.Entries(project).Count(e => LedgerEntry.Parse(e).Kind == kind);

    private Task<ReplayResult> ReplayAsync(string project) => bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop);

    // Codes as a number, a preparation of three steps, a path on it with a tie, rows left out, and the rule to its end.
    private async Task<string> ProjectAsync()
    {
        var project = await bench.ProjectAsync();
        var received = await bench.SourceAsync(project, Table);
        source = received.Source.Id;
        var dataset = received.Dataset.Id;
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, dataset, "tenure_code", new VariableChange(null, null, VariableKind.Continuous, ["4"], null, null, "4 is unknown"), Bench.Stop);
        var made = await bench.Get<MakePreparation>().ExecuteAsync(
            Bench.Analyst, project,
            new PreparationRequest(dataset, null,
            [
                new StepRequest(StepKind.ExcludeRows, "a school", [3], ExclusionCause.OutsidePopulation),
                new StepRequest(StepKind.Collapse, "fire or not", Variable: "heat", NewVariable: "fire", Groups: [new GroupRequest("yes", ["oil", "gas"]), new GroupRequest("no", ["wood"])]),
                new StepRequest(StepKind.CompleteCases, "age is needed", Variables: ["age"]),
            ]),
            false, Bench.Stop);
        var path = await bench.PathAsync(project, Bench.Start(dataset, "saved", "area", "volume", "age", "tenure_code", "fire") with
        {
            PreparationId = made.Preparation.Id,
            Rule = new RuleRecord(ChoosingDirection.Backward, Criterion.P, 0.9),
        });
        var without = await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id, new DecisionRequest(DecisionKind.ExcludeRows, null, [5], ExclusionCause.RecordingError, null, "checked", path.Revisions[0].Id), false, Bench.Stop);
        var chosen = await bench.Get<ChooseByRule>().ExecuteAsync(Bench.Analyst, project, path.Path.Id, new ChooseRequest("the rule", without.Id), false, Bench.Stop);
        last = chosen.Revisions.Count > 0 ? chosen.Revisions[^1] : without;
        return project;
    }
}
