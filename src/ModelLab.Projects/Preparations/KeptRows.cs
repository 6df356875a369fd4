using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Preparations;

/// <summary>The rows that a preparation leaves.</summary>
public static class KeptRows
{
    /// <summary>All zero-based rows of a source.</summary>
    /// <exception cref="RefusedException">There are more than fit into memory.</exception>
    public static int[] All(SourceView source) =>
        source.Rows <= Array.MaxLength
            ? [.. Enumerable.Range(0, (int)source.Rows)]
            : throw RefusedException.Invalid($"The source has {source.Rows} rows; at most {Array.MaxLength} can be analysed together. Split the file.");

    /// <summary>Zero-based rows left after all steps, ascending; all rows without a preparation.</summary>
    public static async Task<int[]> ApplyAsync(
        DatasetColumns columns, string projectId, SourceView source, PreparationView? preparation, DataDictionary? dictionary, CancellationToken cancellation)
    {
        var kept = All(source);
        foreach (var step in preparation?.Steps ?? [])
        {
            kept = await ApplyAsync(columns, projectId, source, step, dictionary!, kept, cancellation);
        }

        return kept;
    }

    /// <summary>Rows left after one step.</summary>
    public static async Task<int[]> ApplyAsync(
        DatasetColumns columns, string projectId, SourceView source, PreparationStep step, DataDictionary dictionary, int[] kept, CancellationToken cancellation)
    {
        switch (step.Kind)
        {
            case StepKind.ExcludeRows:
                var excluded = step.Rows!.Select(r => (int)(r - 1)).ToHashSet();
                return [.. kept.Where(r => !excluded.Contains(r))];
            case StepKind.RestoreRows:
                return [.. kept.Concat(step.Rows!.Select(r => (int)(r - 1))).Distinct().Order()];
            case StepKind.CompleteCases:
                return (await CompleteAsync(columns, projectId, source, step, dictionary, kept, cancellation)).Rows;
            default:
                return kept;
        }
    }

    /// <summary>Complete cases of a step's variables among rows.</summary>
    public static async Task<CompleteRows> CompleteAsync(
        DatasetColumns columns, string projectId, SourceView source, PreparationStep step, DataDictionary dictionary, int[] kept, CancellationToken cancellation)
    {
        var names = step.Variables!.Select(id => dictionary.Require(id).Name).ToList();
        return CompleteRows.Find(await columns.ReadAsync(projectId, source, dictionary, names, cancellation), kept);
    }
}
