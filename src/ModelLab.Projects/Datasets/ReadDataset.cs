using ModelLab.Intake.Csv;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Description;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Datasets;

/// <summary>A variable with what was seen of it.</summary>
/// <param name="Variable">Its description.</param>
/// <param name="Reference">Name of the reference category, or null.</param>
/// <param name="Questions">What a person should look at.</param>
/// <param name="Numbers">Descriptives, for numbers.</param>
/// <param name="Categories">Counts, for categories.</param>
public sealed record VariableReading(
    VariableView Variable, string? Reference, IReadOnlyList<IntakeQuestion> Questions, NumberDescription? Numbers, CategoryDescription? Categories);

/// <summary>A dataset with its dictionary and descriptives.</summary>
/// <param name="Dataset">The dataset.</param>
/// <param name="Source">Where it was read from.</param>
/// <param name="FileName">Name of the file as received.</param>
/// <param name="Variables">The variables in the order of the file.</param>
public sealed record DatasetReading(DatasetView Dataset, SourceView Source, string? FileName, IReadOnlyList<VariableReading> Variables);

/// <summary>Shows a dataset.</summary>
public sealed class ReadDataset(ProjectGate gate, IProjectStore store, ISourceVault vault, DatasetColumns columns)
{
    private const long CellsAtATime = 4_000_000;

    /// <summary>Dictionary and descriptives, over all rows.</summary>
    public async Task<DatasetReading> ExecuteAsync(Caller caller, string projectId, string datasetId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var found = await FindAsync(projectId, datasetId, cancellation);
        var contents = await SourceContents.OpenAsync(vault, projectId, found.Dictionary.Dataset, cancellation);
        var fileName = EntryKinds.ReadSealed<string>(await vault.UnsealAsync(projectId, found.Source.EntryNumber, cancellation), "fileName");
        var readings = new List<VariableReading>();

        // Few columns at a time, and none of them kept: a large file is described without holding all of it.
        var passing = found.Source.Rows * found.Dictionary.Variables.Count > CellsAtATime ? new DatasetColumns(vault, new ColumnCache(budget: 0)) : columns;
        var group = (int)Math.Max(1, CellsAtATime / Math.Max(1, found.Source.Rows));
        foreach (var some in found.Dictionary.Variables.Chunk(group))
        {
            var requests = some.Select(v => Request(v, contents)).ToList();
            var wanted = requests.OfType<ColumnRequest>().ToList();
            var read = (await passing.ReadAsync(projectId, found.Source, wanted, cancellation)).ToDictionary(c => c.Name, StringComparer.Ordinal);
            readings.AddRange(some.Select(v => Reading(v, contents, read.GetValueOrDefault(v.Name))));
        }

        return new DatasetReading(found.Dictionary.Dataset, found.Source, fileName, readings);
    }

    /// <summary>Pearson correlations of the continuous variables, pair by pair, over all rows.</summary>
    public async Task<IReadOnlyList<Correlation>> CorrelationsAsync(Caller caller, string projectId, string datasetId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var found = await FindAsync(projectId, datasetId, cancellation);
        var contents = await SourceContents.OpenAsync(vault, projectId, found.Dictionary.Dataset, cancellation);
        var numbers = found.Dictionary.Variables.Where(v => DatasetColumns.EntersAsNumber(v, contents)).Select(v => new ColumnRequest(v.Name, true, v.MissingCodes)).ToList();
        var read = await columns.ReadAsync(projectId, found.Source, numbers, cancellation);
        return await Task.Run(() => Correlations.Pearson([.. read.Cast<NumberColumn>()], [], 0.95), cancellation);
    }

    private Task<Found> FindAsync(string projectId, string datasetId, CancellationToken cancellation) => store.ReadAsync(
        projectId,
        m =>
        {
            var dataset = m.Find<DatasetView>(datasetId) ?? throw RefusedException.NotFound("such dataset");
            return new Found(DataDictionary.At(m, dataset), m.Find<SourceView>(dataset.SourceId)!);
        },
        cancellation);

    private static ColumnRequest? Request(VariableView variable, SourceContents contents) =>
        DatasetColumns.EntersAsNumber(variable, contents) ? new ColumnRequest(variable.Name, true, variable.MissingCodes)
        : contents.Categories(variable.Name) is { Count: > 0 } categories ? new ColumnRequest(variable.Name, false, variable.MissingCodes, categories)
        : null;

    private static VariableReading Reading(VariableView variable, SourceContents contents, Column? column)
    {
        var counts = column is CategoryColumn category ? Descriptives.Describe(category) : null;
        var present = contents.Present(variable.Name, variable.MissingCodes);
        return new VariableReading(
            variable,
            counts is not null && contents.Reference(variable) is { } reference ? contents.Categories(variable.Name)[reference] : null,
            contents.Of(variable.Name).Questions,
            column is NumberColumn number ? Descriptives.Describe(number) : null,
            counts is null ? null : counts with { Categories = [.. counts.Categories.Where(c => present.Contains(c.Index))] });
    }

    private sealed record Found(DataDictionary Dictionary, SourceView Source);
}
