using ModelLab.Intake;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Records;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Tests.Hosting;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Tests;

/// <summary>
/// The main job on open data: Palmer penguins (Gorman, Williams and Fraser 2014; CC0). Expected figures: 100-digit arithmetic
/// from the decimals in the file, agreeing with a double-precision fit by statsmodels.
/// </summary>
public sealed class PenguinsJourneyTests : IDisposable
{
    private static readonly string[] Candidates = ["beak_length_mm", "beak_depth_mm", "flipper_length_mm", "species", "island", "sex"];
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task The_full_model_has_the_published_figures()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Bench.Fixture("penguins.csv"));
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "body_mass_g", Candidates));
        var full = Assert.Single(path.Revisions);

        Assert.Equal(333, full.N);
        Close(-1500.029095491959841682517, full.Coefficients[0].Estimate);
        Close(575.8222294852715380720859, full.Coefficients[0].StandardError);
        Close(18.18931508893466816533337, full.Coefficients[1].Estimate);
        Close(0.01126981001200861956039743, full.Coefficients[1].P);
        Close(0.8752231072357970477585144, full.Fit.RSquared);
        Close(287.922701874079999312161, full.Fit.S);
        Close(1.85180595903925024268105e-141, full.Fit.P);
        Close(4727.242108571553005810836, full.Fit.Aic);
        Close(28311936.02466589215634277, full.Fit.Press);
        Assert.Equal(9, full.Fit.Cp);
        Assert.Equal(["Chinstrap", "Gentoo"], full.Coefficients.Where(c => c.Term == "species").Select(c => c.Category));
        Assert.Equal("Adelie", full.Terms.Single(t => t.Term == "species").Reference);
        Assert.Equal(2, full.Terms.Single(t => t.Term == "island").Df);
        Assert.Contains(full.Rows.Losses, l => l is { Variable: "sex", Missing: 11 });
    }

    [Fact]
    public async Task The_rule_runs_to_its_end_and_every_step_replays_bit_for_bit()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Bench.Fixture("penguins.csv"));
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "body_mass_g", Candidates) with
        {
            Rule = new RuleRecord(ChoosingDirection.Backward, Criterion.P, 0.05),
        });
        var chosen = await bench.Get<ChooseByRule>().ExecuteAsync(Bench.Analyst, project, path.Path.Id, new ChooseRequest("the rule of the plan", path.Revisions[0].Id), false, Bench.Stop);

        Assert.Equal(["island"], chosen.Revisions.Select(r => r.Decision.Term));
        Assert.All(chosen.Revisions, r => Assert.Equal(333, r.N));
        Assert.All(chosen.Revisions, r => Assert.Contains(r.Notices, n => n.Contains("ignore the choosing", StringComparison.Ordinal)));
        var run = EntryKinds.Read<RuleRun>(Ledger.Entries.LedgerEntry.Parse(bench.Store.Entries(project)[^1]));
        Assert.Equal(chosen.Revisions.Select(r => r.Id), run.RevisionIds);
        Assert.Equal(chosen.Ending, run.Ending);
        var again = await bench.Get<ChooseByRule>().ExecuteAsync(Bench.Analyst, project, path.Path.Id, new ChooseRequest("once more", chosen.Revisions[^1].Id), false, Bench.Stop);
        Assert.Empty(again.Revisions);
        Assert.Equal("once more", Ledger.Entries.LedgerEntry.Parse(bench.Store.Entries(project)[^1]).Reason);
        var replay = await bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop);
        Assert.True(replay.Ok);
        Assert.Equal(2, replay.Revisions.Count);
        Assert.All(replay.Revisions, r => Assert.Equal(0, r.LargestRelativeDifference));
        var verified = await bench.Get<ReadLedger>().VerifyAsync(Bench.Analyst, project, Bench.Stop);
        Assert.True(verified.Ok, verified.Problem);
    }

    [Fact]
    public async Task No_cell_of_the_file_stands_open_in_the_ledger_or_in_the_read_model()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Bench.Fixture("penguins.csv"), fileName: "penguins-of-the-palmer-station.csv");
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "island", new VariableChange(null, null, VariableKind.Categorical, null, "Dream", null, "most rows"), Bench.Stop);
        var made = await bench.Get<MakePreparation>().ExecuteAsync(
            Bench.Analyst, project,
            new PreparationRequest(source.Dataset.Id, null, [new StepRequest(
                StepKind.Collapse, "the large one", Variable: "species", NewVariable: "large", Groups: [new GroupRequest("Gentoo", ["Gentoo"]), new GroupRequest("small", ["Adelie", "Chinstrap"])])]),
            false, Bench.Stop);
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "body_mass_g", Candidates) with
        {
            Terms = [.. Candidates.Where(c => c != "species").Append("large").Select(c => new VariableTerm(c))],
            PreparationId = made.Preparation.Id,
            Rule = new RuleRecord(ChoosingDirection.Backward, Criterion.P, 1e-9),
        });
        Assert.Equal("Dream", path.Revisions[0].Terms.Single(t => t.Term == "island").Reference);
        Assert.Equal("Gentoo", path.Revisions[0].Terms.Single(t => t.Term == "large").Reference);
        await bench.Get<ChooseByRule>().ExecuteAsync(Bench.Analyst, project, path.Path.Id, new ChooseRequest("to the end", path.Revisions[0].Id), false, Bench.Stop);
        var corrected = await bench.SourceAsync(project, Bench.Fixture("penguins.csv"), source.Dataset.Id, "palmer-station-2.csv");
        await bench.Get<RunPathAgain>().ExecuteAsync(Bench.Analyst, project, path.Path.Id, new AgainRequest("again", corrected.Dataset.Id, "sent again"), Bench.Stop);

        var open = string.Concat(bench.Store.Entries(project).Select(System.Text.Encoding.UTF8.GetString))
            + string.Concat(bench.Store.Model(project).Collections.SelectMany(c => c.Value.Select(v => System.Text.Json.JsonSerializer.Serialize(v, c.Key, ProjectJson.Options))));
        foreach (var secret in new[] { "Adelie", "Chinstrap", "Gentoo", "Biscoe", "Dream", "Torgersen", "FEMALE", "palmer-station" })
        {
            Assert.DoesNotContain(secret, open, StringComparison.Ordinal);
        }
    }

    private static void Close(double expected, double? actual)
    {
        Assert.NotNull(actual);
        Assert.True(Math.Abs(expected - actual.Value) <= 1e-13 * Math.Abs(expected), $"expected {expected:R}, got {actual:R}");
    }
}
