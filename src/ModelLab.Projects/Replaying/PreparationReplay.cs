using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Replaying;

/// <summary>Applies preparations again, step by step.</summary>
internal sealed class PreparationReplay(string projectId, RecordedProject record, DatasetColumns columns)
{
    /// <summary>Compares what each step does with what is recorded.</summary>
    public async Task<ReplayedPreparation> ReplayAsync(PreparationMade recorded, CancellationToken cancellation)
    {
        var problems = new List<string>();
        try
        {
            await CompareAsync(recorded, problems, cancellation);
        }
        catch (Exception e) when (Unreadable.Is(e))
        {
            problems.Add(Unreadable.Problem(e));
        }

        return new ReplayedPreparation(recorded.PreparationId, problems.Count == 0, problems);
    }

    private async Task CompareAsync(PreparationMade recorded, List<string> problems, CancellationToken cancellation)
    {
        var dataset = record.Model.Find<DatasetView>(recorded.DatasetId)!;
        var dictionary = DataDictionary.At(record.Model, dataset, recorded.DictionaryEntry);
        var source = record.Model.Find<SourceView>(dataset.SourceId)!;
        var kept = KeptRows.All(source);
        foreach (var step in recorded.Steps)
        {
            var again = await StepEffects.ApplyAsync(columns, projectId, source, step, dictionary, kept, cancellation);
            kept = again.Kept;
            if (FigureComparison.LargestRelativeDifference(step, again.Step) != 0)
            {
                problems.Add(
                    $"Step {step.Id} leaves {again.Step.RowsAfter} of {again.Step.RowsBefore} rows and touches {again.Step.Cells} cells; "
                    + $"recorded are {step.RowsAfter} of {step.RowsBefore} and {step.Cells}{(SameLosses(step, again.Step) ? string.Empty : ", and other losses")}.");
            }
        }

        if (recorded.BasedOnId is not null && record.Model.Find<PreparationView>(recorded.BasedOnId) is { } before
            && before.DictionaryEntry == recorded.DictionaryEntry
            && FigureComparison.LargestRelativeDifference(before.Steps, recorded.Steps.Take(before.Steps.Count)) != 0)
        {
            problems.Add("Its first steps are not those of the preparation that it is based on.");
        }
    }

    private static bool SameLosses(PreparationStep a, PreparationStep b) =>
        FigureComparison.LargestRelativeDifference(a.Losses, b.Losses) == 0;
}
