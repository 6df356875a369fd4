using ModelLab.Ledger.Entries;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Preparations;

/// <summary>A preparation formed but not yet recorded.</summary>
/// <param name="Body">What will be recorded.</param>
/// <param name="Labels">Names of the categories that its collapsing steps make.</param>
/// <param name="SourceId">Source under whose key they are sealed.</param>
public sealed record BuiltPreparation(PreparationMade Body, CategoryLabels Labels, string SourceId)
{
    /// <summary>The act that records it.</summary>
    public Act Act(string? reason) => Labels.IsEmpty ? new Act(Body, reason) : new Act(Body, reason, SourceId, Labels.ToContent());

    /// <summary>As a document, before it has an entry.</summary>
    public PreparationView AsView(DateTimeOffset at) =>
        new(Body.PreparationId, Body.DatasetId, Body.BasedOnId, Body.DictionaryEntry, Body.Steps, at, new Author(string.Empty, string.Empty), 0);
}

/// <summary>Checks data decisions and works out what each does, in order.</summary>
public sealed class PreparationBuilder(ProjectGate gate, IProjectStore store, ISourceVault vault, DatasetColumns columns)
{
    /// <summary>
    /// Adds steps to those of a preparation, or begins one. A preparation has one dictionary: where it is not the one under which the
    /// earlier steps were taken, they are taken once more under it, so that what each is recorded to do is what it does.
    /// </summary>
    /// <param name="projectId">The project.</param>
    /// <param name="datasetId">The dataset.</param>
    /// <param name="dictionaryEntry">Entry up to which its dictionary counts; null: as it stands.</param>
    /// <param name="basedOn">The preparation whose steps come first, or null.</param>
    /// <param name="requests">The steps to add.</param>
    /// <param name="cancellation">Stops the work.</param>
    /// <exception cref="RefusedException">A step cannot be taken; says which and why.</exception>
    public async Task<BuiltPreparation> BuildAsync(
        string projectId, string datasetId, long? dictionaryEntry, PreparationView? basedOn, IReadOnlyList<StepRequest> requests, CancellationToken cancellation)
    {
        var state = await store.ReadAsync(
            projectId,
            m =>
            {
                var dataset = m.Find<DatasetView>(datasetId) ?? throw RefusedException.NotFound("such dataset");
                return new State(DataDictionary.At(m, dataset, dictionaryEntry), m.Find<SourceView>(dataset.SourceId)!);
            },
            cancellation);
        var work = new Work(
            projectId, state.Dictionary, state.Source, await SourceContents.OpenAsync(vault, projectId, state.Dictionary.Dataset, cancellation),
            [], CategoryLabels.None, KeptRows.All(state.Source));
        if (basedOn is not null && basedOn.DictionaryEntry == state.Dictionary.Entry)
        {
            work = work with
            {
                Steps = basedOn.Steps,
                Labels = await CategoryLabels.OpenAsync(vault, projectId, basedOn, cancellation),
                Kept = await KeptRows.ApplyAsync(columns, projectId, state.Source, basedOn, state.Dictionary, cancellation),
            };
        }
        else if (basedOn is not null)
        {
            requests = [.. await RepeatedSteps.OfAsync(store, vault, projectId, basedOn, state.Dictionary, cancellation), .. requests];
        }

        foreach (var request in requests)
        {
            work = await AddAsync(work, request ?? throw RefusedException.Invalid("A data decision is empty.", "steps"), cancellation);
        }

        var body = new PreparationMade(gate.NewId(), datasetId, basedOn?.Id, state.Dictionary.Entry, work.Steps);
        return new BuiltPreparation(body, work.Labels, state.Source.Id);
    }

    private async Task<Work> AddAsync(Work work, StepRequest request, CancellationToken cancellation)
    {
        var id = $"s{work.Steps.Count + 1}";
        var reason = Reasons.Require(request.Reason);
        switch (request.Kind)
        {
            case StepKind.ExcludeRows:
                var cause = request.Cause ?? throw RefusedException.Invalid("Give the cause: recordingError, outsidePopulation, duplicate, influence or other.", "cause");
                var excluding = new PreparationStep(id, StepKind.ExcludeRows, reason, AskedRows.Of(work.Source, request.Rows), cause);
                AskedRows.RequireKept(excluding, work.Kept);
                return await AppliedAsync(work, excluding, null, cancellation);
            case StepKind.RestoreRows:
                var restoring = new PreparationStep(id, StepKind.RestoreRows, reason, AskedRows.Of(work.Source, request.Rows));
                await AskedRows.RequireExcludedAsync(
                    columns, work.ProjectId, work.Source, restoring, work.Dictionary, work.Steps, work.Kept, cancellation);
                return await AppliedAsync(work, restoring, null, cancellation);
            case StepKind.Collapse:
                return await CollapseAsync(work, id, reason, request, cancellation);
            case StepKind.CompleteCases:
                return await AppliedAsync(work, new PreparationStep(id, StepKind.CompleteCases, reason, Variables: Variables(work, request)), null, cancellation);
            default:
                throw RefusedException.Invalid("A data decision is one of excludeRows, restoreRows, collapse, completeCases.", "kind");
        }
    }

    private static IReadOnlyList<string> Variables(Work work, StepRequest request) =>
        request.Variables is null || request.Variables.Count == 0 || request.Variables.Contains(null!)
            ? throw RefusedException.Invalid("Name the variables in which a row must be complete.", "variables")
            : [.. request.Variables.Select(v => work.Dictionary.Require(v).VariableId).Distinct(StringComparer.Ordinal)];

    private Task<Work> CollapseAsync(Work work, string id, string reason, StepRequest request, CancellationToken cancellation)
    {
        var variable = work.Dictionary.Require(request.Variable ?? throw RefusedException.Invalid("Name the variable whose categories are put together.", "variable"));
        if (!VariableStates.HasCategories(variable.Kind))
        {
            throw RefusedException.Invalid($"'{variable.Name}' is not categorical. Describe it as categorical first; a measured variable is not cut into groups here.", "variable");
        }

        var name = Reasons.Name(request.NewVariable, "newVariable");
        if (work.Dictionary.Find(name) is not null || work.Steps.Any(s => s.NewVariable == name))
        {
            throw RefusedException.Invalid($"There is a variable named '{name}' already. Collapsing makes a new variable and leaves the old one as it is.", "newVariable");
        }

        var groups = CategoryGroups.Of(request, work.Contents.Categories(variable.Name), work.Contents.Present(variable.Name, variable.MissingCodes));
        var step = new PreparationStep(
            id, StepKind.Collapse, reason, Variable: variable.VariableId, NewVariable: name, Groups: groups.Indexes, Reference: groups.Reference);
        return AppliedAsync(work, step, work.Labels.With(id, groups.Labels), cancellation);
    }

    private async Task<Work> AppliedAsync(Work work, PreparationStep step, CategoryLabels? labels, CancellationToken cancellation)
    {
        var applied = await StepEffects.ApplyAsync(columns, work.ProjectId, work.Source, step, work.Dictionary, work.Kept, cancellation);
        return applied.Kept.Length > 0
            ? work with { Steps = [.. work.Steps, applied.Step], Kept = applied.Kept, Labels = labels ?? work.Labels }
            : throw RefusedException.Invalid($"No row would be left after step {step.Id}.", "steps");
    }

    private sealed record State(DataDictionary Dictionary, SourceView Source);

    private sealed record Work(
        string ProjectId, DataDictionary Dictionary, SourceView Source, SourceContents Contents, IReadOnlyList<PreparationStep> Steps, CategoryLabels Labels, int[] Kept);
}
