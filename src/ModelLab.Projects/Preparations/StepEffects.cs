using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Preparations;

/// <summary>A step with what it does to the rows before it.</summary>
/// <param name="Step">The step, its effects filled in.</param>
/// <param name="Kept">Zero-based rows left after it, ascending.</param>
public sealed record AppliedStep(PreparationStep Step, int[] Kept);

/// <summary>Works out what a data decision does. Recording and replay call the same code.</summary>
public static class StepEffects
{
    /// <summary>Applies a step to the rows that those before it left.</summary>
    public static async Task<AppliedStep> ApplyAsync(
        DatasetColumns columns, string projectId, SourceView source, PreparationStep step, DataDictionary dictionary, int[] kept, CancellationToken cancellation)
    {
        var after = kept;
        long cells = 0;
        IReadOnlyList<RowLoss>? losses = null;
        switch (step.Kind)
        {
            case StepKind.CompleteCases:
                var complete = await KeptRows.CompleteAsync(columns, projectId, source, step, dictionary, kept, cancellation);
                after = complete.Rows;
                losses = complete.Losses;
                break;
            case StepKind.Collapse:
                var column = (await columns.ReadAsync(projectId, source, dictionary, [dictionary.Require(step.Variable!).Name], cancellation))[0];
                cells = kept.LongCount(r => !column.IsMissing(r));
                break;
            default:
                after = await KeptRows.ApplyAsync(columns, projectId, source, step, dictionary, kept, cancellation);
                break;
        }

        return new AppliedStep(step with { RowsBefore = kept.Length, RowsAfter = after.Length, Cells = cells, Losses = losses }, after);
    }
}
