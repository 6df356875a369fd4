using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Datasets;

/// <summary>A variable as described.</summary>
/// <param name="Variable">Its description.</param>
/// <param name="Reference">Name of the reference category; null where it enters as a number.</param>
public sealed record DescribedVariable(VariableView Variable, string? Reference);

/// <summary>Changes or confirms the description of a variable. Paths keep the dictionary with which they started.</summary>
public sealed class DescribeVariable(ProjectGate gate, IProjectStore store, ISourceVault vault, VariableStates states)
{
    /// <summary>Records the description.</summary>
    /// <param name="caller">Who.</param>
    /// <param name="projectId">The project.</param>
    /// <param name="datasetId">The dataset.</param>
    /// <param name="variable">Id or name of the variable.</param>
    /// <param name="change">What changes; nothing: the description is confirmed as it is.</param>
    /// <param name="cancellation">Stops the work.</param>
    public async Task<DescribedVariable> ExecuteAsync(
        Caller caller, string projectId, string datasetId, string variable, VariableChange change, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Analyst, cancellation);
        var reason = Reasons.Require(change.Reason);
        var found = await store.ReadAsync(
            projectId,
            m =>
            {
                var dataset = m.Find<DatasetView>(datasetId) ?? throw RefusedException.NotFound("such dataset");
                return new Found(dataset, m.Find<SourceView>(dataset.SourceId)!, DataDictionary.At(m, dataset).Require(variable));
            },
            cancellation);
        var before = VariableStates.Of(found.Variable);
        var contents = await SourceContents.OpenAsync(vault, projectId, found.Dataset, cancellation);
        var after = await states.ApplyAsync(projectId, found.Source, contents, before, change, cancellation);
        await gate.RecordAsync(
            admission,
            [new Act(new VariableDescribed(datasetId, after, VariableStates.Differences(before, after)), reason)],
            model =>
            {
                var now = DataDictionary.At(model, found.Dataset).Require(found.Variable.VariableId);
                if (now.EntryNumber != found.Variable.EntryNumber)
                {
                    throw new RefusedException(RefusalKind.Stale, $"The description of '{now.Name}' was changed in the meantime (entry {now.EntryNumber}). Nothing was changed; look at it and send your change again.");
                }
            },
            cancellation);
        var described = await store.ReadAsync(projectId, m => DataDictionary.At(m, found.Dataset).Require(found.Variable.VariableId), cancellation);
        return new DescribedVariable(described, Reference(described, contents));
    }

    private static string? Reference(VariableView variable, SourceContents contents)
    {
        if (DatasetColumns.EntersAsNumber(variable, contents))
        {
            return null;
        }

        var categories = contents.Categories(variable.Name);
        return variable.ReferenceCategory is { } index
            ? categories[index]
            : categories.FirstOrDefault(c => !variable.MissingCodes.Contains(c, StringComparer.Ordinal));
    }

    private sealed record Found(DatasetView Dataset, SourceView Source, VariableView Variable);
}
