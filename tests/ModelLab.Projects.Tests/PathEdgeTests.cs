using ModelLab.Intake;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Tests.Hosting;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Tests;

/// <summary>Paths at their edges: nothing left in the model, no intercept, many candidates, odd outcomes, side paths, people who act in between.</summary>
public sealed class PathEdgeTests : IDisposable
{
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task The_last_term_may_leave_beside_an_intercept_and_come_back()
    {
        var (project, dataset) = await ProjectAsync(2, 20);
        var first = await StartAsync(project, dataset, 1, r => r with { Rule = new RuleRecord(ChoosingDirection.Backward, Criterion.P, 0.05) });
        var empty = await bench.DecideAsync(project, first, DecisionKind.Remove, "x1");
        Assert.Single(empty.Coefficients);
        Assert.Equal(0, empty.Fit.RSquared);
        Assert.Equal(0, empty.Fit.DfModel);
        Assert.Null(empty.Fit.F);
        var chosen = await bench.Get<ChooseByRule>().ExecuteAsync(Bench.Analyst, project, empty.PathId, new ChooseRequest("go on", empty.Id), false, Bench.Stop);
        Assert.Empty(chosen.Revisions);
        var back = await bench.DecideAsync(project, empty, DecisionKind.Add, "x1");
        Assert.Equal(first.Fit, back.Fit);
        Assert.True((await ReplayAsync(project)).Ok);
    }

    [Fact]
    public async Task Without_intercept_one_term_stays_whoever_decides()
    {
        var (project, dataset) = await ProjectAsync(2, 20);
        var first = await StartAsync(project, dataset, 2, r => r with { Intercept = false, Rule = new RuleRecord(ChoosingDirection.Backward, Criterion.P, 1e-9) });
        var chosen = await bench.Get<ChooseByRule>().ExecuteAsync(Bench.Analyst, project, first.PathId, new ChooseRequest("all out", first.Id), false, Bench.Stop);
        var last = chosen.Revisions.Count > 0 ? chosen.Revisions[^1] : first;
        Assert.NotEmpty(last.Terms);
        if (last.Terms.Count == 2)
        {
            last = await bench.DecideAsync(project, last, DecisionKind.Remove, "x2");
        }

        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.DecideAsync(project, last, DecisionKind.Remove, last.Terms[0].Term));
        Assert.Contains("last term", refused.Message, StringComparison.Ordinal);
        Assert.Contains(last.Notices, n => n.Contains("Without an intercept", StringComparison.Ordinal));
        Assert.True((await ReplayAsync(project)).Ok);
    }

    [Fact]
    public async Task Two_hundred_candidates()
    {
        var (project, dataset) = await ProjectAsync(200, 210);
        var wide = await StartAsync(project, dataset, 200);
        Assert.Equal(201, wide.Coefficients.Count);
        Assert.Equal(201, wide.Fit.Cp);
        Assert.Equal(9, wide.Fit.DfResidual);
    }

    [Fact]
    public async Task Fifty_predictors_leave_one_at_a_time()
    {
        var (project, dataset) = await ProjectAsync(50, 80);
        var many = await StartAsync(project, dataset, 50, r => r with { Rule = new RuleRecord(ChoosingDirection.Backward, Criterion.Bic, null) });
        var chosen = await bench.Get<ChooseByRule>().ExecuteAsync(Bench.Analyst, project, many.PathId, new ChooseRequest("the rule", many.Id), false, Bench.Stop);
        Assert.Equal(Enumerable.Range(2, chosen.Revisions.Count), chosen.Revisions.Select(r => r.Number));
        Assert.True(chosen.Revisions[^1].Fit.Bic < many.Fit.Bic);
        Assert.Equal(51, many.Fit.Cp);
    }

    [Theory]
    [InlineData(0.49)]
    [InlineData(1.0)]
    [InlineData(95.0)]
    [InlineData(double.NaN)]
    public async Task A_confidence_that_is_none(double confidence)
    {
        var (project, dataset) = await ProjectAsync(2, 20);
        var refused = await Assert.ThrowsAsync<RefusedException>(() => StartAsync(project, dataset, 2, r => r with { Confidence = confidence }));
        Assert.Contains("0.95", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_binary_variable_that_is_coded_1_and_2_is_a_category_as_a_term_and_no_outcome()
    {
        var project = await bench.ProjectAsync();
        var rows = string.Join('\n', Enumerable.Range(1, 24).Select(i => $"{100 + (i * 7 % 13)}.5,{1 + (i % 2)},{i % 2},{i * 5 % 11}.25"));
        var dataset = (await bench.SourceAsync(project, "saved,draught,zero_one,area\n" + rows + "\n")).Dataset.Id;
        foreach (var name in new[] { "draught", "zero_one" })
        {
            await bench.Get<DescribeVariable>().ExecuteAsync(
                Bench.Analyst, project, dataset, name, new VariableChange(null, null, VariableKind.Binary, null, null, null, "yes or no"), Bench.Stop);
        }

        var coded = await bench.PathAsync(project, Bench.Start(dataset, "saved", "draught", "area"));
        var plain = await bench.PathAsync(project, Bench.Start(dataset, "saved", "zero_one", "area") with { Name = "plain" });
        Assert.Equal(["2", null], [coded.Revisions[0].Coefficients[1].Category, plain.Revisions[0].Coefficients[1].Category]);
        Assert.Equal(["1", null], [coded.Revisions[0].Terms[0].Reference, plain.Revisions[0].Terms[0].Reference]);
        Assert.Equal(coded.Revisions[0].Coefficients[1].Estimate, plain.Revisions[0].Coefficients[1].Estimate, 1e-12);
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.PathAsync(
            project, Bench.Start(dataset, "draught", "area") with { Name = "outcome", OutcomeReason = "as the funder asks" }));
        Assert.Contains("not written as 0 and 1", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task An_outcome_is_questioned_as_its_missing_codes_leave_it()
    {
        // 0 to 6 visits, −9 where nobody counted.
        var project = await bench.ProjectAsync();
        var rows = string.Join('\n', Enumerable.Range(1, 40).Select(i => $"{(i % 8 == 7 ? -9 : i % 8)},{i * 5 % 11}.25"));
        var dataset = (await bench.SourceAsync(project, "visits,area\n" + rows + "\n")).Dataset.Id;
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, dataset, "visits", new VariableChange(null, null, VariableKind.Continuous, ["-9"], null, null, "visits"), Bench.Stop);
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.PathAsync(project, Bench.Start(dataset, "visits", "area")));
        Assert.Contains("whole numbers from 0 with 7 distinct values", refused.Message, StringComparison.Ordinal);
        Assert.Single((await bench.PathAsync(project, Bench.Start(dataset, "visits", "area") with { OutcomeReason = "a first look" })).Revisions);
    }

    [Fact]
    public async Task The_reason_for_one_outcome_does_not_serve_another_on_a_side_path()
    {
        var project = await bench.ProjectAsync();
        var rows = string.Join('\n', Enumerable.Range(1, 40).Select(i => $"{i * 3 % 7},{i * 5 % 9},{i * 5 % 11}.25"));
        var dataset = (await bench.SourceAsync(project, "visits,calls,area\n" + rows + "\n")).Dataset.Id;
        foreach (var name in new[] { "visits", "calls" })
        {
            await bench.Get<DescribeVariable>().ExecuteAsync(
                Bench.Analyst, project, dataset, name, new VariableChange(null, null, VariableKind.Continuous, null, null, null, "counts"), Bench.Stop);
        }

        var first = (await bench.PathAsync(project, Bench.Start(dataset, "visits", "area") with { OutcomeReason = "visits are many" })).Revisions[0];
        var side = new StartRequest("side", null, null, null, null, null, null, null, null, null, first.Id, null, "another outcome");
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.PathAsync(project, side with { Outcome = "calls" }));
        Assert.Contains("'calls' looks like a count", refused.Message, StringComparison.Ordinal);
        Assert.Equal("visits are many", (await bench.PathAsync(project, side)).Path.Plan.OutcomeReason);
    }

    [Fact]
    public async Task A_side_path_run_again_still_says_that_its_terms_were_chosen()
    {
        var (project, dataset) = await ProjectAsync(3, 30);
        var first = await StartAsync(project, dataset, 3);
        var second = await bench.DecideAsync(project, first, DecisionKind.Remove, "x2");
        var side = await bench.PathAsync(project, new StartRequest("side", null, null, null, null, null, null, null, null, null, second.Id, null, "from here"));
        var id = await bench.Get<RunPathAgain>().ExecuteAsync(Bench.Analyst, project, side.Path.Id, new AgainRequest("again", dataset, "once more"), Bench.Stop);
        var again = await bench.Get<ReadRevision>().PathAsync(Bench.Analyst, project, id, Bench.Stop);
        Assert.Equal(["x1", "x3"], again.Revisions[0].Terms.Select(t => t.Term));
        Assert.Contains(again.Revisions[0].Notices, n => n.Contains("ignore the choosing", StringComparison.Ordinal));
        Assert.DoesNotContain(first.Notices, n => n.Contains("ignore the choosing", StringComparison.Ordinal));
        Assert.True((await ReplayAsync(project)).Ok);
    }

    [Fact]
    public async Task A_finding_accepted_on_a_path_is_open_on_its_side_path_until_it_is_accepted_there()
    {
        var project = await bench.ProjectAsync();
        var rows = string.Join('\n', Enumerable.Range(1, 30).Select(i => $"{100 + (i * 7 % 13)}.5,{i}.25,{(2 * i) + (i % 3)}.75"));
        var dataset = (await bench.SourceAsync(project, "saved,area,volume\n" + rows + "\n")).Dataset.Id;
        var first = (await bench.PathAsync(project, Bench.Start(dataset, "saved", "area", "volume"))).Revisions[0];
        await bench.Get<ManageFindings>().AcceptAsync(Bench.Analyst, project, first.Findings[0].Id!, "both measure size", Bench.Stop);
        var side = (await bench.PathAsync(project, new StartRequest("side", null, null, null, null, null, null, null, null, null, first.Id, null, "from here"))).Revisions[0];
        Assert.NotEqual(first.Findings[0].Id, Assert.Single(side.Findings).Id);
        Assert.Equal(FindingState.Open, side.Findings[0].State);
        await bench.DecideAsync(project, side, DecisionKind.Remove, "volume");
        var states = await bench.Get<ManageFindings>().AllAsync(Bench.Analyst, project, Bench.Stop);
        Assert.Equal([FindingState.Accepted, FindingState.Gone], states.Select(f => f.State));
        Assert.True((await ReplayAsync(project)).Ok);
    }

    [Fact]
    public async Task A_large_tied_set_names_its_strongest_pairs_alone()
    {
        var project = await bench.ProjectAsync();
        var names = Enumerable.Range(1, 8).Select(c => $"x{c}").ToList();
        var rows = string.Join('\n', Enumerable.Range(1, 40).Select(i => $"{100 + (i * 7 % 13)}.5,{string.Join(',', names.Select((_, c) => $"{(10 * i) + (i * i % (11 + (2 * c)))}.25"))}"));
        var dataset = (await bench.SourceAsync(project, $"saved,{string.Join(',', names)}\n{rows}\n")).Dataset.Id;
        var first = (await bench.PathAsync(project, Bench.Start(dataset, "saved", [.. names]))).Revisions[0];
        Assert.Contains("and 18 weaker pairs", Assert.Single(first.Findings).Finding.Text, StringComparison.Ordinal);
        Assert.Equal(28, Assert.Single(first.Collinearity).Pairs.Count);
    }

    [Fact]
    public async Task Somebody_faster_wins_and_nothing_of_the_slower_decision_is_stored()
    {
        var (project, dataset) = await ProjectAsync(3, 30);
        var first = await StartAsync(project, dataset, 3);
        bench.Store.BeforeCommit = () => bench.DecideAsync(project, first, DecisionKind.Remove, "x2").GetAwaiter().GetResult();
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.DecideAsync(project, first, DecisionKind.Remove, "x3"));
        Assert.Equal(RefusalKind.Stale, refused.Kind);
        Assert.Contains("x2 removed", refused.Message, StringComparison.Ordinal);
        Assert.Equal(2, (await bench.Get<ReadRevision>().PathAsync(Bench.Analyst, project, first.PathId, Bench.Stop)).Revisions.Count);
        Assert.True((await ReplayAsync(project)).Ok);
    }

    [Fact]
    public async Task Who_is_no_longer_a_member_when_the_fit_is_done_records_nothing()
    {
        var (project, dataset) = await ProjectAsync(3, 30);
        var first = await StartAsync(project, dataset, 3);
        bench.Store.BeforeCommit = () => bench.Get<People.ManageMembers>().RemoveAsync(Bench.Owner, project, "analyst", "left", Bench.Stop).GetAwaiter().GetResult();
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.DecideAsync(project, first, DecisionKind.Remove, "x3"));
        Assert.Equal(RefusalKind.NotFound, refused.Kind);
        Assert.Single(bench.Store.Model(project).All<RevisionView>());
    }

    [Fact]
    public async Task Two_paths_of_one_name_at_once()
    {
        var (project, dataset) = await ProjectAsync(3, 30);
        bench.Store.BeforeCommit = () => StartAsync(project, dataset, 2).GetAwaiter().GetResult();
        var refused = await Assert.ThrowsAsync<RefusedException>(() => StartAsync(project, dataset, 3, r => r with { Name = "MAIN" }));
        Assert.Equal(RefusalKind.Conflict, refused.Kind);
        Assert.Single(bench.Store.Model(project).All<PathView>());
    }

    [Theory]
    [InlineData("\u200B")]
    [InlineData("\u2060 \uFEFF")]
    [InlineData("\u00A0")]
    public async Task A_reason_that_nobody_can_see_is_none(string reason)
    {
        var (project, dataset) = await ProjectAsync(2, 20);
        var first = await StartAsync(project, dataset, 2);
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.DecideAsync(project, first, DecisionKind.Remove, "x1", reason: reason));
        Assert.Contains("Say why", refused.Message, StringComparison.Ordinal);
    }

    private Task<ReplayResult> ReplayAsync(string project) => bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop);

    private async Task<RevisionReading> StartAsync(string project, string dataset, int terms, Func<StartRequest, StartRequest>? but = null)
    {
        var request = Bench.Start(dataset, "saved", [.. Enumerable.Range(1, terms).Select(c => $"x{c}")]);
        return (await bench.PathAsync(project, but is null ? request : but(request))).Revisions[0];
    }

    // Independent columns: uniform numbers from a fixed seed.
    private async Task<Made> ProjectAsync(int columns, int rows)
    {
        var project = await bench.ProjectAsync();
        var draws = new Random(20260504);
        var header = "saved," + string.Join(',', Enumerable.Range(1, columns).Select(c => $"x{c}"));
        var lines = Enumerable.Range(0, rows).Select(_ => string.Join(',', Enumerable.Range(0, columns + 1).Select(_ => draws.NextDouble().ToString("0.0000", System.Globalization.CultureInfo.InvariantCulture))));
        var source = await bench.SourceAsync(project, header + "\n" + string.Join('\n', lines) + "\n");
        return new Made(project, source.Dataset.Id);
    }

    private sealed record Made(string Project, string Dataset);
}
