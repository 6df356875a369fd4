using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Preparations;

/// <summary>The steps of a preparation as they are asked for once more: on a corrected dataset, or under a later dictionary.</summary>
public static class RepeatedSteps
{
    /// <summary>
    /// The steps as requests: rows by number, variables by id, categories by name. A category that is no longer there leaves its
    /// group; a new one is in no group, and is refused when the step is taken.
    /// </summary>
    /// <param name="model">Where the old dictionary is read from.</param>
    /// <param name="vault">Where names of categories are sealed.</param>
    /// <param name="projectId">The project.</param>
    /// <param name="old">The preparation as recorded.</param>
    /// <param name="now">The dictionary under which the steps are taken.</param>
    /// <param name="cancellation">Stops the work.</param>
    public static async Task<IReadOnlyList<StepRequest>> OfAsync(
        IReadModelSource model, ISourceVault vault, string projectId, PreparationView old, DataDictionary now, CancellationToken cancellation)
    {
        var dictionary = await model.ReadAsync(
            projectId, m => DataDictionary.At(m, m.Find<DatasetView>(old.DatasetId)!, old.DictionaryEntry), cancellation);
        var names = new Names(
            await CategoryLabels.OpenAsync(vault, projectId, old, cancellation),
            dictionary,
            await SourceContents.OpenAsync(vault, projectId, dictionary.Dataset, cancellation),
            now,
            await SourceContents.OpenAsync(vault, projectId, now.Dataset, cancellation));
        return [.. old.Steps.Select(s => Again(s, names))];
    }

    private static StepRequest Again(PreparationStep step, Names names)
    {
        if (step.Kind != StepKind.Collapse)
        {
            return new StepRequest(step.Kind, step.Reason, step.Rows, step.Cause, Variables: step.Variables);
        }

        var variable = names.Before.Require(step.Variable!).Name;
        var before = names.ContentsBefore.Categories(variable);
        var present = names.ContentsNow.Present(variable, names.Now.Require(variable).MissingCodes)
            .Select(i => names.ContentsNow.Categories(variable)[i]).ToHashSet(StringComparer.Ordinal);
        var labels = names.Labels.Of(step.Id);
        return new StepRequest(
            step.Kind, step.Reason, Variable: variable, NewVariable: step.NewVariable,
            Groups: [.. step.Groups!.Select((g, i) => new GroupRequest(labels[i], [.. g.Select(c => before[c]).Where(present.Contains)]))],
            Reference: labels[step.Reference ?? 0]);
    }

    private sealed record Names(
        CategoryLabels Labels, DataDictionary Before, SourceContents ContentsBefore, DataDictionary Now, SourceContents ContentsNow);
}
