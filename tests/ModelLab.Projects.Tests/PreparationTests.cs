using ModelLab.Intake;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Tests.Hosting;

namespace ModelLab.Projects.Tests;

/// <summary>Data decisions: which dictionary they follow, what comes back, what is refused.</summary>
public sealed class PreparationTests : IDisposable
{
    private static readonly string Table = "saved,area,age,heat\n" + string.Join('\n', Enumerable.Range(1, 30).Select(i =>
        $"{100 + (i * 7 % 13)}.5,{i * 5 % 11}.25,{(i % 10 == 0 ? "99" : $"{i * 11 % 17}")},{(i % 3) switch { 0 => "gas", 1 => "oil", _ => "wood" }}")) + "\n";

    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task Leaving_rows_out_of_a_path_keeps_the_dictionary_of_the_earlier_steps()
    {
        var (project, dataset) = await ProjectAsync();
        await MissingAsync(project, dataset, "age", "99");
        var made = await MakeAsync(project, dataset, null, new StepRequest(StepKind.CompleteCases, "age is needed", Variables: ["age"]));
        Assert.Equal(27, made.Preparation.Steps[0].RowsAfter);
        await MissingAsync(project, dataset, "age");
        var path = await bench.PathAsync(project, Bench.Start(dataset, "saved", "area") with { PreparationId = made.Preparation.Id });
        Assert.Equal(27, path.Revisions[0].N);
        var without = await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id, new DecisionRequest(DecisionKind.ExcludeRows, null, [1], ExclusionCause.Duplicate, null, "twice", path.Revisions[0].Id), false, Bench.Stop);
        Assert.Equal(26, without.N);
        Assert.True((await ReplayAsync(project)).Ok);
    }

    [Fact]
    public async Task Adding_steps_under_a_later_dictionary_takes_the_earlier_ones_once_more()
    {
        var (project, dataset) = await ProjectAsync();
        await MissingAsync(project, dataset, "age", "99");
        var made = await MakeAsync(project, dataset, null, new StepRequest(StepKind.CompleteCases, "age is needed", Variables: ["age"]));
        await MissingAsync(project, dataset, "age", "99", "11");
        var more = await MakeAsync(project, dataset, made.Preparation.Id, new StepRequest(StepKind.ExcludeRows, "a school", [2], ExclusionCause.OutsidePopulation));
        Assert.True(more.Preparation.Steps[0].RowsAfter < 27);
        Assert.Equal(more.Preparation.Steps[0].RowsAfter, more.Preparation.Steps[1].RowsBefore);
        Assert.Equal("age is needed", more.Preparation.Steps[0].Reason);
        Assert.Equal(27, (await bench.Get<MakePreparation>().OneAsync(Bench.Analyst, project, made.Preparation.Id, Bench.Stop)).Preparation.Steps[0].RowsAfter);
        Assert.True((await ReplayAsync(project)).Ok);
    }

    [Fact]
    public async Task A_new_category_of_a_later_dictionary_is_asked_for_and_a_vanished_one_is_not()
    {
        var (project, dataset) = await ProjectAsync();
        var collapse = new StepRequest(
            StepKind.Collapse, "few", Variable: "heat", NewVariable: "fire", Groups: [new GroupRequest("yes", ["gas", "oil"]), new GroupRequest("no", ["wood"])]);
        var made = await MakeAsync(project, dataset, null, collapse);
        await MissingAsync(project, dataset, "heat", "oil");
        var exclude = new StepRequest(StepKind.ExcludeRows, "a school", [2], ExclusionCause.OutsidePopulation);
        var fewer = await MakeAsync(project, dataset, made.Preparation.Id, exclude);
        Assert.Equal(20, fewer.Preparation.Steps[0].Cells);
        Assert.Equal([1, 1], fewer.Preparation.Steps[0].Groups!.Select(g => g.Count));
        await MissingAsync(project, dataset, "heat");
        var refused = await Assert.ThrowsAsync<RefusedException>(() => MakeAsync(project, dataset, fewer.Preparation.Id, exclude with { Rows = [3] }));
        Assert.Contains("oil is in no group", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Two_variables_made_of_one_enter_together()
    {
        var (project, dataset) = await ProjectAsync();
        var made = await MakeAsync(
            project, dataset, null,
            new StepRequest(StepKind.Collapse, "few", Variable: "heat", NewVariable: "fire", Groups: [new GroupRequest("yes", ["gas", "oil"]), new GroupRequest("no", ["wood"])]),
            new StepRequest(StepKind.Collapse, "few", Variable: "heat", NewVariable: "piped", Groups: [new GroupRequest("gas", ["gas"]), new GroupRequest("not", ["oil", "wood"])]));
        var path = await bench.PathAsync(project, Bench.Start(dataset, "saved", "fire", "piped") with { PreparationId = made.Preparation.Id });
        Assert.Equal(3, path.Revisions[0].Coefficients.Count);
        var same = await bench.PathAsync(project, Bench.Start(dataset, "saved", "heat") with { Name = "whole" });
        Assert.Equal(same.Revisions[0].Fit.SsResidual, path.Revisions[0].Fit.SsResidual, 1e-9);
    }

    [Fact]
    public async Task Only_what_somebody_left_out_comes_back_and_only_where_complete_cases_hold()
    {
        var (project, dataset) = await ProjectAsync();
        await MissingAsync(project, dataset, "age", "99");
        var lost = await RefusedAsync(() => MakeAsync(
            project, dataset, null,
            new StepRequest(StepKind.CompleteCases, "age is needed", Variables: ["age"]), new StepRequest(StepKind.RestoreRows, "back", [10])));
        Assert.Contains("lost to missing values", lost.Message, StringComparison.Ordinal);
        var gap = await RefusedAsync(() => MakeAsync(
            project, dataset, null,
            new StepRequest(StepKind.ExcludeRows, "a school", [10], ExclusionCause.OutsidePopulation),
            new StepRequest(StepKind.CompleteCases, "age is needed", Variables: ["age"]),
            new StepRequest(StepKind.RestoreRows, "no school", [10])));
        Assert.Contains("step s2 keeps complete cases", gap.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_preparation_that_leaves_no_row()
    {
        var (project, dataset) = await ProjectAsync();
        var refused = await RefusedAsync(() => MakeAsync(
            project, dataset, null, new StepRequest(StepKind.ExcludeRows, "all", [.. Enumerable.Range(1, 30)], ExclusionCause.Other)));
        Assert.Contains("No row would be left", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Lists_with_gaps_in_them_are_refused()
    {
        var (project, dataset) = await ProjectAsync();
        await RefusedAsync(() => MakeAsync(project, dataset, null, [null!]));
        await RefusedAsync(() => MakeAsync(project, dataset, null, new StepRequest(StepKind.CompleteCases, "why", Variables: [null!])));
        await RefusedAsync(() => MakeAsync(project, dataset, null, new StepRequest(StepKind.Collapse, "why", Variable: "heat", NewVariable: "h", Groups: [null!, null!])));
        await RefusedAsync(() => MakeAsync(
            project, dataset, null,
            new StepRequest(StepKind.Collapse, "why", Variable: "heat", NewVariable: "h", Groups: [new GroupRequest("a", [null!]), new GroupRequest("b", ["gas"])])));
        await RefusedAsync(() => bench.PathAsync(project, Bench.Start(dataset, "saved") with { Terms = [null!] }));
        await RefusedAsync(() => bench.Get<Comments.ManageComments>().MakeAsync(Bench.Analyst, project, new Place("revision", null!, null), "hm", Bench.Stop));
    }

    [Fact]
    public async Task More_rows_than_fit_into_memory_are_refused()
    {
        var (project, _) = await ProjectAsync();
        var source = bench.Store.Model(project).All<Views.SourceView>()[0] with { Rows = 1L << 32 };
        Assert.Contains("at most", Assert.Throws<RefusedException>(() => KeptRows.All(source)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_preparation_is_carried_to_a_corrected_file_by_name()
    {
        // "ail" is a typing error that somebody had put into the group of oil.
        var project = await bench.ProjectAsync();
        var wrong = await bench.SourceAsync(project, Table.Replace(",oil\n", ",ail\n", StringComparison.Ordinal) + "1.5,2.25,3,oil\n");
        var made = await MakeAsync(
            project, wrong.Dataset.Id, null,
            new StepRequest(StepKind.Collapse, "few", Variable: "heat", NewVariable: "fire", Groups: [new GroupRequest("yes", ["gas", "oil", "ail"]), new GroupRequest("no", ["wood"])], Reference: "no"));
        var path = await bench.PathAsync(project, Bench.Start(wrong.Dataset.Id, "saved", "area", "fire") with { PreparationId = made.Preparation.Id });
        var without = await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id, new DecisionRequest(DecisionKind.ExcludeRows, null, [31], ExclusionCause.RecordingError, null, "no such home", path.Revisions[0].Id), false, Bench.Stop);
        var back = await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id, new DecisionRequest(DecisionKind.RestoreRows, null, [31], null, null, "there is", without.Id), false, Bench.Stop);
        Assert.Null(back.Decision.Cause);

        var right = await bench.SourceAsync(project, Table + "1.5,2.25,3,oil\n", previousDatasetId: wrong.Dataset.Id);
        var again = await AgainAsync(project, path.Path.Id, "right", right.Dataset.Id);
        Assert.Equal("no", again.Revisions[2].Terms.Single(t => t.Term == "fire").Reference);
        Assert.Equal([31, 30, 31], again.Revisions.Select(r => r.N));
        Assert.True((await ReplayAsync(project)).Ok);

        var shorter = await bench.SourceAsync(project, Table, previousDatasetId: wrong.Dataset.Id);
        var before = bench.Store.Entries(project).Count;
        var refused = await RefusedAsync(() => AgainAsync(project, path.Path.Id, "shorter", shorter.Dataset.Id));
        Assert.Contains("revision 2", refused.Message, StringComparison.Ordinal);
        Assert.Contains("30 rows where the earlier one had 31", refused.Message, StringComparison.Ordinal);
        Assert.Equal(before, bench.Store.Entries(project).Count);
    }

    private static async Task<RefusedException> RefusedAsync(Func<Task> act)
    {
        var refused = await Assert.ThrowsAsync<RefusedException>(act);
        Assert.Equal(RefusalKind.Invalid, refused.Kind);
        return refused;
    }

    private Task<ReplayResult> ReplayAsync(string project) => bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop);

    private async Task<Revisions.PathReading> AgainAsync(string project, string path, string name, string dataset) =>
        await bench.Get<Revisions.ReadRevision>().PathAsync(
            Bench.Analyst, project, await bench.Get<RunPathAgain>().ExecuteAsync(Bench.Analyst, project, path, new AgainRequest(name, dataset, "corrected"), Bench.Stop), Bench.Stop);

    private Task<PreparationReading> MakeAsync(string project, string dataset, string? basedOn, params StepRequest[] steps) =>
        bench.Get<MakePreparation>().ExecuteAsync(Bench.Analyst, project, new PreparationRequest(dataset, basedOn, steps), false, Bench.Stop);

    private async Task MissingAsync(string project, string dataset, string variable, params string[] codes) =>
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, dataset, variable, new VariableChange(null, null, null, codes, null, null, "as the code list says"), Bench.Stop);

    private async Task<Prepared> ProjectAsync()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Table);
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "age", new VariableChange(null, null, VariableKind.Continuous, null, null, null, "years"), Bench.Stop);
        return new Prepared(project, source.Dataset.Id);
    }

    private sealed record Prepared(string Project, string Dataset);
}
