using System.Globalization;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Tests.Hosting;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Tests;

public sealed class RunPathAgainTests : IDisposable
{
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task Where_the_rule_still_takes_the_term_the_record_says_so()
    {
        var (project, path, dataset) = await ChosenAsync();
        var corrected = await bench.SourceAsync(project, Table(40, slopeOfB: 0, lift: 5), previousDatasetId: dataset);
        var decision = (await AgainAsync(project, path, corrected.Dataset.Id)).Revisions[1].Decision;
        Assert.Equal("b", decision.Term);
        Assert.True(decision.ByRule);
        Assert.Contains("above 0.05: it is removed", decision.RuleSays, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Where_the_rule_would_keep_the_term_the_record_does_not_say_that_the_rule_took_it()
    {
        var (project, path, dataset) = await ChosenAsync();
        var corrected = await bench.SourceAsync(project, Table(40, slopeOfB: 3, lift: 0), previousDatasetId: dataset);
        var again = await AgainAsync(project, path, corrected.Dataset.Id);
        var decision = again.Revisions[1].Decision;
        Assert.Equal("b", decision.Term);
        Assert.Equal("the rule of the plan", decision.Reason);
        Assert.Equal(1.02475305e-51, decision.Evidence!.P!.Value, 1e-59);
        Assert.False(decision.ByRule);
        Assert.Contains("nothing is removed", decision.RuleSays, StringComparison.Ordinal);
        Assert.True((await bench.Get<Replaying.ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop)).Ok);
    }

    [Fact]
    public async Task Rows_left_out_by_number_are_not_carried_over_where_rows_came_or_went()
    {
        var (project, path, dataset) = await ChosenAsync();
        var last = (await bench.Get<ReadRevision>().PathAsync(Bench.Analyst, project, path, Bench.Stop)).Revisions[^1];
        await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, path, new DecisionRequest(DecisionKind.ExcludeRows, null, [9], ExclusionCause.Duplicate, null, "twice in the file", last.Id), false, Bench.Stop);
        var shorter = await bench.SourceAsync(project, Table(39, slopeOfB: 0, lift: 0), previousDatasetId: dataset);
        var entries = bench.Store.Entries(project).Count;
        var refused = await Assert.ThrowsAsync<RefusedException>(() => AgainAsync(project, path, shorter.Dataset.Id));
        Assert.Contains("revision 3 (excludeRows)", refused.Message, StringComparison.Ordinal);
        Assert.Contains("39 rows where the earlier one had 40", refused.Message, StringComparison.Ordinal);
        Assert.Equal(entries, bench.Store.Entries(project).Count);

        var equal = await bench.SourceAsync(project, Table(40, slopeOfB: 0, lift: 5), previousDatasetId: dataset);
        Assert.Equal(39, (await AgainAsync(project, path, equal.Dataset.Id)).Revisions[^1].N);
    }

    /// <summary>Without a slope, the partial p of b is 0.342860463, with a slope of 3 it is 1.02475305e-51 (statsmodels 0.13.5, OLS).</summary>
    private static string Table(int rows, int slopeOfB, int lift) =>
        "y,a,b\n" + string.Concat(Enumerable.Range(0, rows).Select(i => string.Create(
            CultureInfo.InvariantCulture, $"{(2 * (i * 7 % 11)) + (slopeOfB * (i * 5 % 13)) + (0.25 * (i * i * 3 % 7)) + lift},{i * 7 % 11},{i * 5 % 13}\n")));

    private async Task<Chosen> ChosenAsync()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Table(40, slopeOfB: 0, lift: 0));
        foreach (var name in new[] { "a", "b" })
        {
            await bench.Get<Datasets.DescribeVariable>().ExecuteAsync(
                Bench.Analyst, project, source.Dataset.Id, name,
                new Datasets.VariableChange(null, null, Intake.VariableKind.Continuous, null, null, null, "measured"), Bench.Stop);
        }

        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "y", "a", "b") with { Rule = new RuleRecord(ChoosingDirection.Backward, Criterion.P, 0.05) });
        var chosen = await bench.Get<ChooseByRule>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id, new ChooseRequest("the rule of the plan", path.Revisions[0].Id), false, Bench.Stop);
        Assert.Equal(["b"], chosen.Revisions.Select(r => r.Decision.Term));
        Assert.True(chosen.Revisions[0].Decision.ByRule);
        Assert.Equal(0.342860463, chosen.Revisions[0].Decision.Evidence!.P!.Value, 1e-9);
        return new Chosen(project, path.Path.Id, source.Dataset.Id);
    }

    private async Task<PathReading> AgainAsync(string project, string path, string dataset)
    {
        var id = await bench.Get<RunPathAgain>().ExecuteAsync(Bench.Analyst, project, path, new AgainRequest($"again on {dataset}", dataset, "corrected"), Bench.Stop);
        return await bench.Get<ReadRevision>().PathAsync(Bench.Analyst, project, id, Bench.Stop);
    }

    private sealed record Chosen(string Project, string Path, string Dataset);
}
