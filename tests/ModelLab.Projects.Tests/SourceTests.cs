using ModelLab.Intake;
using ModelLab.Projects.Comments;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Sources;
using ModelLab.Projects.Tests.Hosting;

namespace ModelLab.Projects.Tests;

public sealed class SourceTests : IDisposable
{
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task A_source_is_given_back_as_it_was_received()
    {
        var project = await bench.ProjectAsync();
        var received = await bench.SourceAsync(project, Bench.Fixture("penguins.csv"), fileName: "penguins.csv");
        var listed = Assert.Single(await bench.Get<ReadSources>().AllAsync(Bench.Analyst, project, Bench.Stop));
        Assert.Equal((received.Source, "penguins.csv"), (listed.Source, listed.FileName));
        var content = await bench.Get<ReadSources>().OpenAsync(Bench.Analyst, project, received.Source.Id, Bench.Stop);
        using var bytes = new MemoryStream();
        await using (content.Content)
        {
            await content.Content.CopyToAsync(bytes, Bench.Stop);
        }

        Assert.Equal(Bench.Fixture("penguins.csv"), bytes.ToArray());
    }

    [Fact]
    public async Task Naming_the_kind_or_nothing_confirms_it_and_describing_something_else_does_not()
    {
        var project = await bench.ProjectAsync();
        var source = await bench.SourceAsync(project, Bench.Fixture("penguins.csv"));
        Assert.False((await DescribeAsync("beak_depth_mm", new VariableChange("Depth", "mm", null, null, null, null, "from the paper"))).Confirmed);
        Assert.True((await DescribeAsync("beak_depth_mm", new VariableChange(null, null, null, null, null, null, "it is so"))).Confirmed);
        Assert.True((await DescribeAsync("beak_length_mm", new VariableChange(null, null, VariableKind.Continuous, null, null, null, "measured"))).Confirmed);
        var refused = await Assert.ThrowsAsync<RefusedException>(() => DescribeAsync("species", new VariableChange(null, null, VariableKind.Date, null, null, null, "a slip")));
        Assert.Contains("no dates", refused.Message, StringComparison.Ordinal);

        async Task<Views.VariableView> DescribeAsync(string variable, VariableChange change) =>
            (await bench.Get<DescribeVariable>().ExecuteAsync(Bench.Analyst, project, source.Dataset.Id, variable, change, Bench.Stop)).Variable;
    }

    [Fact]
    public async Task A_comment_may_name_a_variable_and_a_term_by_the_variables_name()
    {
        var project = await bench.ProjectAsync();
        var rows = string.Join('\n', Enumerable.Range(1, 20).Select(i => $"{100 + (i * 7 % 13)}.5,{i * 3 % 17}.25"));
        var source = await bench.SourceAsync(project, "saved,floor area\n" + rows + "\n");
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "saved", "floor area"));
        var comments = bench.Get<ManageComments>();
        var term = await comments.MakeAsync(Bench.Analyst, project, new Place("term", path.Revisions[0].Id!, "floor area"), "why?", Bench.Stop);
        Assert.Equal("\"floor area\"", term.Place.Part);
        var variable = await comments.MakeAsync(Bench.Analyst, project, new Place("variable", source.Dataset.Id, "floor area"), "in m²?", Bench.Stop);
        Assert.Equal("v2", variable.Place.Part);
    }
}
