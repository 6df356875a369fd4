using ModelLab.Intake;
using ModelLab.Projects.Comments;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Tests.Hosting;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Tests;

/// <summary>What is refused is refused with a clear message, and the ledger is not a byte longer.</summary>
public sealed class RefusalTests : IDisposable
{
    private const string Small =
        """
        id,saved,area,age,heat,flat,gappy
        a1,120,80,30,gas,7,1
        a2,150,95,41,oil,7,1
        a3,90,60,22,gas,7,
        a4,200,120,35,wood,7,1
        a5,170,101,60,oil,7,1
        a6,130,77,18,gas,7,1
        a7,160,99,44,wood,7,1
        a8,110,70,52,gas,7,2
        a9,210,118,27,oil,7,
        """;

    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Theory]
    [InlineData("nothing", "area", RefusalKind.Invalid, "no variable 'nothing'")]
    [InlineData("heat", "area", RefusalKind.Invalid, "measured outcome")]
    [InlineData("id", "area", RefusalKind.Invalid, "measured outcome")]
    [InlineData("saved", "id", RefusalKind.Invalid, "identifier")]
    [InlineData("saved", "saved", RefusalKind.Invalid, "cannot explain itself")]
    [InlineData("saved", "area,area", RefusalKind.Invalid, "named twice")]
    [InlineData("saved", "area,flat", RefusalKind.Invalid, "flat")]
    [InlineData("saved", "", RefusalKind.Invalid, "at least one candidate")]
    public async Task A_path_that_cannot_start(string outcome, string terms, RefusalKind kind, string says)
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Small);
        await RefusedAsync(project, kind, says, () => bench.PathAsync(project, Bench.Start(source.Dataset.Id, outcome, terms.Split(',', StringSplitOptions.RemoveEmptyEntries))));
    }

    [Fact]
    public async Task A_predictor_that_is_constant_once_missing_rows_are_gone()
    {
        var project = await bench.ProjectAsync();
        var csv = Small.Replace("a8,110,70,52,gas,7,2", "a8,110,,52,gas,7,2", StringComparison.Ordinal);
        var source = await bench.SourceAsync(project, csv);
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "gappy", new VariableChange(null, null, VariableKind.Continuous, null, null, null, "a count"), Bench.Stop);
        await RefusedAsync(project, RefusalKind.Invalid, "gappy", () => bench.PathAsync(project, Bench.Start(source.Dataset.Id, "saved", "area", "gappy")));
    }

    [Fact]
    public async Task A_reference_category_for_a_variable_without_categories()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, "y,x\n5.5,1.5\n6.5,2.5\n7.5,3.5\n8.5,4.5\n");
        await RefusedAsync(project, RefusalKind.Invalid, "'x' is none of them", () => bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "x", new VariableChange(null, null, null, null, "2.5", null, "the base"), Bench.Stop));
        var described = await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "x", new VariableChange(null, null, VariableKind.Categorical, null, "2.5", null, "four sites"), Bench.Stop);
        Assert.Equal("2.5", described.Reference);
    }

    [Fact]
    public async Task An_outcome_without_variance()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, "y,x\n5.5,1.5\n5.5,2.5\n5.5,3.5\n5.5,4.5\n");
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "y", new VariableChange(null, null, VariableKind.Continuous, null, null, null, "measured"), Bench.Stop);
        await RefusedAsync(project, RefusalKind.Invalid, "y", () => bench.PathAsync(project, Bench.Start(source.Dataset.Id, "y", "x") with { OutcomeReason = "only to see" }));
    }

    [Fact]
    public async Task No_more_rows_than_the_rank()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, "y,a,b\n1.5,1.1,2.3\n2.5,2.7,0.1\n4.5,3.2,9.4\n");
        await RefusedAsync(project, RefusalKind.Invalid, "row", () => bench.PathAsync(project, Bench.Start(source.Dataset.Id, "y", "a", "b")));
    }

    [Fact]
    public async Task A_binary_outcome_is_questioned_and_taken_with_a_reason()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, "yes,x\n1,1.5\n0,2.5\n1,3.5\n0,4.5\n1,9.5\n0,0.5\n");
        var request = Bench.Start(source.Dataset.Id, "yes", "x");
        await RefusedAsync(project, RefusalKind.Invalid, "two values", () => bench.PathAsync(project, request));
        var path = await bench.PathAsync(project, request with { OutcomeReason = "A linear probability model is what the funder asked for." });
        Assert.Contains(path.Revisions[0].Notices, n => n.Contains("funder", StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_count_outcome_is_questioned()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, "visits,x\n1,1.5\n0,2.5\n3,3.5\n2,4.5\n1,9.5\n4,0.5\n0,1.25\n");
        await bench.Get<DescribeVariable>().ExecuteAsync(
            Bench.Analyst, project, source.Dataset.Id, "visits", new VariableChange(null, null, VariableKind.Continuous, null, null, null, "counted"), Bench.Stop);
        await RefusedAsync(project, RefusalKind.Invalid, "count", () => bench.PathAsync(project, Bench.Start(source.Dataset.Id, "visits", "x")));
    }

    [Fact]
    public async Task An_empty_reason_and_a_stale_after()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Small);
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "saved", "area", "age", "heat"));
        var first = path.Revisions[0];
        await RefusedAsync(project, RefusalKind.Invalid, "Say why", () => bench.DecideAsync(project, first, DecisionKind.Remove, "age", reason: "  "));
        await bench.DecideAsync(project, first, DecisionKind.Remove, "age", reason: "age says little");
        var refused = await RefusedAsync(project, RefusalKind.Stale, "age says little", () => bench.DecideAsync(project, first, DecisionKind.Remove, "heat"));
        Assert.Single(refused.Details);
        await RefusedAsync(project, RefusalKind.Invalid, "after", () => bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id, new DecisionRequest(DecisionKind.Remove, new VariableTerm("heat"), null, null, null, "why not", null), false, Bench.Stop));
    }

    [Fact]
    public async Task Terms_that_cannot_leave_or_come()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Small);
        var request = Bench.Start(source.Dataset.Id, "saved", "area", "age");
        var path = await bench.PathAsync(project, request with
        {
            Terms = [new VariableTerm("area"), new PowerTerm("area", 2), new VariableTerm("age")],
            HeldIn = [new VariableTerm("age")],
        });
        var first = path.Revisions[0];
        await RefusedAsync(project, RefusalKind.Invalid, "held in", () => bench.DecideAsync(project, first, DecisionKind.Remove, "age"));
        await RefusedAsync(project, RefusalKind.Invalid, "marginality", () => bench.DecideAsync(project, first, DecisionKind.Remove, "area"));
        await RefusedAsync(project, RefusalKind.Invalid, "not in the model", () => bench.DecideAsync(project, first, DecisionKind.Remove, "heat"));
        await RefusedAsync(project, RefusalKind.Invalid, "already", () => bench.DecideAsync(project, first, DecisionKind.Add, "age"));
        await RefusedAsync(project, RefusalKind.Invalid, "no candidate", () => bench.DecideAsync(project, first, DecisionKind.Add, "heat"));
        await RefusedAsync(project, RefusalKind.Invalid, "no choosing rule", () => bench.Get<ChooseByRule>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id, new ChooseRequest("go", first.Id), false, Bench.Stop));
        await RefusedAsync(project, RefusalKind.Invalid, "area", () => bench.PathAsync(project, request with { Name = "other", Terms = [new PowerTerm("area", 2)] }));
        await RefusedAsync(project, RefusalKind.Invalid, "removeAbove", () => bench.PathAsync(
            project, request with { Name = "other", Rule = new RuleRecord(ChoosingDirection.Backward, Criterion.P, null) }));
    }

    [Fact]
    public async Task A_category_removed_in_part()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Small);
        Task<PreparationReading> Collapse(params GroupRequest[] groups) => bench.Get<MakePreparation>().ExecuteAsync(
            Bench.Analyst, project,
            new PreparationRequest(source.Dataset.Id, null, [new StepRequest(StepKind.Collapse, "few", Variable: "heat", NewVariable: "heat2", Groups: groups)]),
            false, Bench.Stop);
        await RefusedAsync(project, RefusalKind.Invalid, "wood is in no group", () => Collapse(new GroupRequest("gas", ["gas"]), new GroupRequest("oil", ["oil"])));
        await RefusedAsync(project, RefusalKind.Invalid, "two groups", () => Collapse(new GroupRequest("gas", ["gas", "oil"]), new GroupRequest("other", ["oil", "wood"])));
        await RefusedAsync(project, RefusalKind.Invalid, "same label", () => Collapse(new GroupRequest("a", ["gas", "oil"]), new GroupRequest("a", ["wood"])));
    }

    [Theory]
    [InlineData("0")]
    [InlineData("10")]
    [InlineData("-1")]
    public async Task Rows_that_are_not_there(string row)
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Small);
        await RefusedAsync(project, RefusalKind.Invalid, $"no row {row}", () => bench.Get<MakePreparation>().ExecuteAsync(
            Bench.Analyst, project,
            new PreparationRequest(source.Dataset.Id, null, [new StepRequest(StepKind.ExcludeRows, "wrong", [long.Parse(row, null)], ExclusionCause.RecordingError)]),
            false, Bench.Stop));
    }

    [Fact]
    public async Task A_file_that_is_no_table_leaves_nothing_in_the_vault()
    {
        var project = await bench.ProjectAsync();
        var before = bench.Store.Entries(project).Count;
        await Assert.ThrowsAsync<IntakeRefusedException>(() => bench.SourceAsync(project, "a,b\n1,2\n1,2,3\n"));
        await Assert.ThrowsAsync<IntakeRefusedException>(() => bench.SourceAsync(project, [0x50, 0x4B, 0x03, 0x04, 0, 0, 0, 0]));
        await Assert.ThrowsAsync<RefusedException>(() => bench.SourceAsync(project, "e-mail,x\nann@marrowvale.example,1\nbob@marrowvale.example,2\ncy@marrowvale.example,3\n"));
        Assert.Equal(0, bench.Store.SourcesHeld);
        Assert.Equal(before, bench.Store.Entries(project).Count);
    }

    [Fact]
    public async Task A_comment_at_a_place_that_is_not_there()
    {
        var project = await bench.ProjectAsync();
        await RefusedAsync(project, RefusalKind.Invalid, "no such revision", () => bench.Get<ManageComments>().MakeAsync(Bench.Analyst, project, new Place("revision", "none", null), "hm", Bench.Stop));
        await RefusedAsync(project, RefusalKind.Invalid, "no kind of place", () => bench.Get<ManageComments>().MakeAsync(Bench.Analyst, project, new Place("moon", "none", null), "hm", Bench.Stop));
        await RefusedAsync(project, RefusalKind.Invalid, "empty comment", () => bench.Get<ManageComments>().MakeAsync(Bench.Analyst, project, new Place("project", project, null), " ", Bench.Stop));
    }

    private async Task<RefusedException> RefusedAsync(string project, RefusalKind kind, string says, Func<Task> act)
    {
        var before = bench.Store.Entries(project).Count;
        var refused = await Assert.ThrowsAsync<RefusedException>(act);
        Assert.Equal(kind, refused.Kind);
        Assert.Contains(says, refused.Message, StringComparison.OrdinalIgnoreCase);
        Assert.Equal(before, bench.Store.Entries(project).Count);
        return refused;
    }
}
