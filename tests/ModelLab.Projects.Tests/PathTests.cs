using ModelLab.Intake;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Comments;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Tests.Hosting;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Tests;

/// <summary>Decisions, rows, side paths, corrected files and findings on the penguins.</summary>
public sealed class PathTests : IDisposable
{
    private static readonly string[] Candidates = ["beak_length_mm", "beak_depth_mm", "flipper_length_mm", "species", "island", "sex"];
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task A_preview_shows_the_consequence_and_stores_nothing()
    {
        var (project, first, _) = await PenguinsAsync();
        var before = bench.Store.Entries(project).Count;
        var preview = await bench.DecideAsync(project, first, DecisionKind.Remove, "island", preview: true, reason: "");
        Assert.Equal(before, bench.Store.Entries(project).Count);
        Assert.Null(preview.Id);
        Assert.Null(preview.Hash);
        var stored = await bench.DecideAsync(project, first, DecisionKind.Remove, "island");
        Assert.Equal(preview.Fit, stored.Fit);
        Assert.Equal(preview.Coefficients, stored.Coefficients);
        Assert.NotNull(stored.Hash);
        Assert.Equal(first.Terms.Single(t => t.Term == "island").F, stored.Decision.Evidence!.F);
    }

    [Fact]
    public async Task A_term_that_comes_back_gives_the_same_model()
    {
        var (project, first, _) = await PenguinsAsync();
        var without = await bench.DecideAsync(project, first, DecisionKind.Remove, "species");
        var again = await bench.DecideAsync(project, without, DecisionKind.Add, "species");
        Assert.Equal(first.Coefficients, again.Coefficients);
        Assert.Equal(first.Fit, again.Fit);
        Assert.Equal(first.Fingerprint, again.Fingerprint);
        Assert.Equal(3, again.Number);
        Assert.Equal(RecomputedCp(first, without), without.Fit.Cp!.Value, 1e-9);
    }

    [Fact]
    public async Task Excluding_rows_makes_a_preparation_and_a_revision_in_one_batch_and_they_can_come_back()
    {
        var (project, first, _) = await PenguinsAsync();
        var without = await RowsAsync(project, first, DecisionKind.ExcludeRows, [1, 2, 40]);
        Assert.Equal(330, without.N);
        var entries = bench.Store.Entries(project).TakeLast(2).Select(b => LedgerEntry.Parse(b)).ToList();
        Assert.Equal(["preparation-made/1", "revision/1"], entries.Select(e => e.Kind));
        Assert.Equal(entries[0].At, entries[1].At);
        var back = await RowsAsync(project, without, DecisionKind.RestoreRows, [1, 2, 40]);
        Assert.Equal(first.Fit, back.Fit);
        Assert.Equal(first.Rows.Hash, back.Rows.Hash);
        var twice = await Assert.ThrowsAsync<RefusedException>(() => RowsAsync(project, back, DecisionKind.RestoreRows, [1]));
        Assert.Contains("not left out", twice.Message, StringComparison.Ordinal);
        Assert.True((await bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop)).Ok);
    }

    [Fact]
    public async Task Rows_left_out_for_influence_and_categories_without_rows_are_said()
    {
        var (project, first, _) = await PenguinsAsync();
        Assert.DoesNotContain(first.Notices, n => n.Contains("influence", StringComparison.Ordinal) || n.Contains("no row", StringComparison.Ordinal));
        var species = System.Text.Encoding.UTF8.GetString(Bench.Fixture("penguins.csv")).Split('\n').Skip(1).Select((line, i) => (line, row: (long)i + 1));
        var chinstraps = species.Where(r => r.line.StartsWith("Chinstrap", StringComparison.Ordinal)).Select(r => r.row).ToList();
        var without = await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, first.PathId,
            new DecisionRequest(DecisionKind.ExcludeRows, null, chinstraps, ExclusionCause.Influence, null, "to see", first.Id), false, Bench.Stop);
        Assert.Contains(without.Notices, n => n.StartsWith("Chinstrap of species has no row", StringComparison.Ordinal));
        Assert.Contains(without.Notices, n => n.StartsWith($"{chinstraps.Count} rows were left out because of their influence", StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_member_that_has_no_meaning_for_the_decision_is_refused()
    {
        var (project, first, _) = await PenguinsAsync();
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, first.PathId, new DecisionRequest(DecisionKind.Remove, new VariableTerm("island"), [1], null, null, "why", first.Id), false, Bench.Stop));
        Assert.Equal("rows", Assert.Single(refused.Details).Column);
    }

    [Fact]
    public async Task A_restart_takes_up_all_candidates_or_an_earlier_revision()
    {
        var (project, first, _) = await PenguinsAsync();
        var second = await bench.DecideAsync(project, first, DecisionKind.Remove, "island");
        var third = await bench.DecideAsync(project, second, DecisionKind.Remove, "beak_length_mm");
        var restart = await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, first.PathId, new DecisionRequest(DecisionKind.Restart, null, null, null, second.Id, "one step back", third.Id), false, Bench.Stop);
        Assert.Equal(second.Coefficients, restart.Coefficients);
        var all = await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, first.PathId, new DecisionRequest(DecisionKind.Restart, null, null, null, null, "from the beginning", restart.Id), false, Bench.Stop);
        Assert.Equal(first.Coefficients, all.Coefficients);
        Assert.Equal(5, all.Number);
    }

    [Fact]
    public async Task A_side_path_leaves_a_revision_with_its_terms_and_rows()
    {
        var (project, first, _) = await PenguinsAsync();
        var second = await bench.DecideAsync(project, first, DecisionKind.Remove, "island");
        var side = await bench.PathAsync(project, new StartRequest("side", null, null, null, null, null, null, null, null, 0.9, second.Id, null, "another view"));
        Assert.Equal(second.Id, side.Path.FromRevisionId);
        Assert.Equal(second.Coefficients.Select(c => c.Estimate), side.Revisions[0].Coefficients.Select(c => c.Estimate));
        Assert.True(side.Revisions[0].Coefficients[1].Upper < second.Coefficients[1].Upper);
        Assert.Contains(side.Revisions[0].Notices, n => n.Contains("ignore the choosing", StringComparison.Ordinal));
    }

    [Fact]
    public async Task Collapsed_categories_make_a_new_variable_and_leave_the_old_one()
    {
        var (project, first, dataset) = await PenguinsAsync();
        var made = await bench.Get<MakePreparation>().ExecuteAsync(
            Bench.Analyst, project,
            new PreparationRequest(dataset, null,
            [
                new StepRequest(StepKind.Collapse, "Gentoo against the rest", Variable: "species", NewVariable: "gentoo",
                    Groups: [new GroupRequest("other", ["Adelie", "Chinstrap"]), new GroupRequest("Gentoo", ["Gentoo"])]),
                new StepRequest(StepKind.CompleteCases, "same rows everywhere", Variables: ["sex", "beak_length_mm"]),
            ]),
            false, Bench.Stop);
        Assert.Equal([344L, 344L], made.Preparation.Steps.Select(s => s.RowsBefore));
        Assert.Equal(333, made.Preparation.Steps[1].RowsAfter);
        Assert.Contains(made.Preparation.Steps[1].Losses!, l => l is { Variable: "sex", Missing: 11, Alone: 9 });
        var path = await bench.PathAsync(project, Bench.Start(dataset, "body_mass_g", "flipper_length_mm", "gentoo", "sex") with { Name = "gentoo", PreparationId = made.Preparation.Id });
        var coefficient = Assert.Single(path.Revisions[0].Coefficients, c => c.Term == "gentoo");
        Assert.Equal("Gentoo", coefficient.Category);
        Assert.Equal("other", path.Revisions[0].Terms.Single(t => t.Term == "gentoo").Reference);
        Assert.Equal(first.N, path.Revisions[0].N);
        Assert.True((await bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop)).Ok);
    }

    [Fact]
    public async Task A_corrected_file_becomes_a_new_dataset_on_which_the_path_runs_again()
    {
        var (project, first, dataset) = await PenguinsAsync();
        await bench.DecideAsync(project, first, DecisionKind.Remove, "island", reason: "says nothing beyond species");
        var corrected = System.Text.Encoding.UTF8.GetString(Bench.Fixture("penguins.csv")).Replace("39.1,18.7,181,3750", "39.1,18.7,181,3570", StringComparison.Ordinal);
        var source = await bench.SourceAsync(project, corrected, previousDatasetId: dataset);
        Assert.Equal(dataset, source.Dataset.PreviousDatasetId);
        Assert.True(source.Variables.Single(v => v.Name == "sex").Confirmed);
        var id = await bench.Get<RunPathAgain>().ExecuteAsync(Bench.Analyst, project, first.PathId, new AgainRequest("corrected", source.Dataset.Id, "a typing error"), Bench.Stop);
        var again = await bench.Get<ReadRevision>().PathAsync(Bench.Analyst, project, id, Bench.Stop);
        Assert.Equal(first.PathId, again.Path.AgainOfPathId);
        Assert.Equal(["island"], again.Revisions.Skip(1).Select(r => r.Decision.Term));
        Assert.Equal("says nothing beyond species", again.Revisions[1].Decision.Reason);
        Assert.NotEqual(first.Fit.SsResidual, again.Revisions[0].Fit.SsResidual);
        Assert.Equal("MALE", again.Revisions[0].Terms.Single(t => t.Term == "sex").Reference);
        var stranger = await bench.SourceAsync(project, "body_mass_g,sex\n1.5,a\n2.5,b\n3.5,a\n4.5,b\n");
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.Get<RunPathAgain>().ExecuteAsync(
            Bench.Analyst, project, first.PathId, new AgainRequest("other", stranger.Dataset.Id, "why"), Bench.Stop));
        Assert.Contains("does not correct", refused.Message, StringComparison.Ordinal);
        Assert.True((await bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop)).Ok);
    }

    [Fact]
    public async Task A_later_change_of_the_dictionary_leaves_old_revisions_as_they_are()
    {
        var (project, first, dataset) = await PenguinsAsync();
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, dataset, "sex", new VariableChange(null, null, null, null, "FEMALE", null, "the other way round"), Bench.Stop);
        var second = await bench.DecideAsync(project, first, DecisionKind.Remove, "island");
        Assert.Equal("MALE", second.Terms.Single(t => t.Term == "sex").Reference);
        var fresh = await bench.PathAsync(project, Bench.Start(dataset, "body_mass_g", Candidates) with { Name = "fresh" });
        Assert.Equal("FEMALE", fresh.Revisions[0].Terms.Single(t => t.Term == "sex").Reference);
        Assert.Equal(first.Fit.RSquared, fresh.Revisions[0].Fit.RSquared, 1e-14);
        Assert.True((await bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop)).Ok);
    }

    [Fact]
    public async Task Tied_predictors_are_found_accepted_and_gone_with_their_cause()
    {
        // Two measures of size (r 0.99), one of age.
        var project = await bench.ProjectAsync();
        var rows = string.Join('\n', Enumerable.Range(1, 30).Select(i => $"{100 + (i * 7 % 13)}.5,{i}.25,{(2 * i) + (i % 3)}.75,{i * 11 % 17}.5"));
        var source = await bench.SourceAsync(project, "saved,area,volume,age\n" + rows + "\n");
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "saved", "area", "volume", "age"));
        var finding = Assert.Single(path.Revisions[0].Findings);
        Assert.Equal("tied-predictors", finding.Finding.Rule);
        Assert.Equal(["area", "volume"], finding.Finding.Subject);
        Assert.Equal(FindingState.Open, finding.State);
        var second = await bench.DecideAsync(project, path.Revisions[0], DecisionKind.Remove, "age");
        Assert.Equal(finding.Id, Assert.Single(second.Findings).Id);
        await bench.Get<ManageFindings>().AcceptAsync(Bench.Analyst, project, finding.Id!, "both measure size", Bench.Stop);
        var third = await bench.DecideAsync(project, second, DecisionKind.Remove, "volume");
        Assert.Empty(third.Findings);
        Assert.Single((await bench.Get<ReadRevision>().OneAsync(Bench.Analyst, project, second.Id!, Bench.Stop)).Findings);
        var now = Assert.Single(await bench.Get<ManageFindings>().AllAsync(Bench.Analyst, project, Bench.Stop));
        Assert.Equal(FindingState.Gone, now.State);
    }

    [Fact]
    public async Task Codes_entered_as_a_number_are_found()
    {
        var project = await bench.ProjectAsync();
        var rows = string.Join('\n', Enumerable.Range(1, 40).Select(i => $"{100 + (i * 7 % 13)}.5,{1 + (i % 4)},{i * 3 % 17}.25"));
        var source = await bench.SourceAsync(project, "saved,tenure_code,area\n" + rows + "\n");
        Assert.Equal(VariableKind.Categorical, source.Variables.Single(v => v.Name == "tenure_code").Kind);
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "tenure_code", new VariableChange(null, null, VariableKind.Continuous, null, null, null, "quick look"), Bench.Stop);
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "saved", "tenure_code", "area"));
        var finding = Assert.Single(path.Revisions[0].Findings);
        Assert.Equal("coded-category", finding.Finding.Rule);
        Assert.Equal(new Place("term", path.Revisions[0].Id!, "tenure_code"), finding.Finding.Place);
        var silent = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "saved", "area") with { Name = "silent" });
        Assert.Empty(silent.Revisions[0].Findings);
    }

    [Fact]
    public async Task Comments_stand_at_their_place_until_settled()
    {
        var (project, first, _) = await PenguinsAsync();
        var comments = bench.Get<ManageComments>();
        var comment = await comments.MakeAsync(new("reviewer"), project, new Place("term", first.Id!, "island"), "Why is island in?", Bench.Stop);
        var reply = await comments.ReplyAsync(Bench.Analyst, project, comment.Id, "It was planned.", Bench.Stop);
        Assert.Equal(comment.Place, reply.Place);
        await comments.SettleAsync(new("reviewer"), project, reply.Id, "answered", Bench.Stop);
        var settled = (await comments.AllAsync(Bench.Analyst, project, Bench.Stop)).Single(c => c.Id == comment.Id);
        Assert.True(settled.Settled);
        Assert.Equal("The reviewer", settled.SettledBy!.Name);
        await Assert.ThrowsAsync<RefusedException>(() => comments.ReplyAsync(Bench.Analyst, project, comment.Id, "more", Bench.Stop));
    }

    [Fact]
    public async Task The_read_model_formed_again_from_the_ledger_equals_the_stored_one()
    {
        var (project, first, _) = await PenguinsAsync();
        await RowsAsync(project, await bench.DecideAsync(project, first, DecisionKind.Remove, "island"), DecisionKind.ExcludeRows, [7]);
        var rebuilt = new MemoryReadModel();
        foreach (var bytes in bench.Store.Entries(project))
        {
            ProjectProjection.Apply(LedgerEntry.Parse(bytes), rebuilt);
        }

        static string Written(MemoryReadModel model) => string.Join('\n', model.Collections.SelectMany(c => c.Value.Select(v => System.Text.Json.JsonSerializer.Serialize(v, c.Key, ProjectJson.Options))));
        Assert.Equal(Written(bench.Store.Model(project)), Written(rebuilt));
    }

    [Fact]
    public async Task Row_wise_results_are_computed_for_the_rows_analysed()
    {
        var (project, first, _) = await PenguinsAsync();
        var rows = await bench.Get<ReadRevision>().RowsAsync(Bench.Analyst, project, first.Id!, Bench.Stop);
        Assert.Equal(333, rows.RowNumbers.Count);
        Assert.Equal([1L, 2L, 3L, 5L], rows.RowNumbers.Take(4));

        // 100-digit arithmetic from the decimals in the file.
        Assert.Equal(3753.163895955637492129771, rows.Results.Fitted[0], 1e-9);
        Assert.Equal(0.04309420191755943169152356, rows.Results.Leverage[0], 1e-14);
        Assert.Equal(6.314377308669133193149848e-7, rows.Results.CooksDistance[0]!.Value, 1e-18);
    }

    private static double RecomputedCp(RevisionReading full, RevisionReading part) =>
        (part.Fit.SsResidual / (full.Fit.SsResidual / full.Fit.DfResidual)) - part.N + (2 * part.Coefficients.Count);

    private async Task<RevisionReading> RowsAsync(string project, RevisionReading after, DecisionKind kind, IReadOnlyList<long> rows) =>
        await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, after.PathId,
            new DecisionRequest(kind, null, rows, kind == DecisionKind.ExcludeRows ? ExclusionCause.RecordingError : null, null, "checked on paper", after.Id), false, Bench.Stop);

    private async Task<Penguins> PenguinsAsync()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Bench.Fixture("penguins.csv"));
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "sex", new VariableChange("Sex", null, VariableKind.Binary, null, "MALE", null, "as in the dictionary"), Bench.Stop);
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "body_mass_g", Candidates));
        return new Penguins(project, path.Revisions[0], source.Dataset.Id);
    }

    private sealed record Penguins(string Project, RevisionReading First, string Dataset);
}
