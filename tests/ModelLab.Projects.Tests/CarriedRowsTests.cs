using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Tests.Hosting;

namespace ModelLab.Projects.Tests;

public sealed class CarriedRowsTests : IDisposable
{
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task Rows_left_out_are_carried_where_they_are_the_same_units_and_refused_where_the_file_is_in_another_order()
    {
        var project = await bench.ProjectAsync();
        var lines = Enumerable.Range(1, 20).Select(i => $"H{i:000},{100 + (i * 7 % 13)}.5,{i * 3 % 17}.25").ToList();
        string File(IEnumerable<string> rows) => "dwelling_id,saved,area\n" + string.Join('\n', rows) + "\n";
        var source = await bench.SourceAsync(project, File(lines));
        var path = await bench.PathAsync(project, Bench.Start(source.Dataset.Id, "saved", "area"));
        await bench.Get<TakeDecision>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id,
            new DecisionRequest(DecisionKind.ExcludeRows, null, [4], ExclusionCause.RecordingError, null, "typed wrongly", path.Revisions[0].Id), false, Bench.Stop);

        var same = await bench.SourceAsync(project, File(lines.Select(l => l.Replace("107.5", "108.5", StringComparison.Ordinal))), source.Dataset.Id);
        await bench.Get<RunPathAgain>().ExecuteAsync(Bench.Analyst, project, path.Path.Id, new AgainRequest("same order", same.Dataset.Id, "corrected"), Bench.Stop);

        var turned = await bench.SourceAsync(project, File(lines.AsEnumerable().Reverse()), source.Dataset.Id);
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.Get<RunPathAgain>().ExecuteAsync(
            Bench.Analyst, project, path.Path.Id, new AgainRequest("other order", turned.Dataset.Id, "corrected"), Bench.Stop));
        Assert.Contains("row 4 has another dwelling_id", refused.Message, StringComparison.Ordinal);
        Assert.Equal(4, Assert.Single(refused.Details).Row);
    }
}
