using ModelLab.Intake;
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
    /// <summary>Adds steps to those of a preparation, or begins one.</summary>
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
            [.. basedOn?.Steps ?? []], await CategoryLabels.OpenAsync(vault, projectId, basedOn, cancellation),
            await KeptRows.ApplyAsync(columns, projectId, state.Source, basedOn, state.Dictionary, cancellation));
        foreach (var request in requests)
        {
            work = await AddAsync(work, request, cancellation);
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
                return await RowsAsync(work, new PreparationStep(id, StepKind.ExcludeRows, reason, Numbers(work, request.Rows), cause), cancellation);
            case StepKind.RestoreRows:
                return await RowsAsync(work, new PreparationStep(id, StepKind.RestoreRows, reason, Numbers(work, request.Rows)), cancellation);
            case StepKind.Collapse:
                return await CollapseAsync(work, id, reason, request, cancellation);
            case StepKind.CompleteCases:
                return await CompleteCasesAsync(work, id, reason, request, cancellation);
            default:
                throw RefusedException.Invalid("A data decision is one of excludeRows, restoreRows, collapse, completeCases.", "kind");
        }
    }

    private static IReadOnlyList<long> Numbers(Work work, IReadOnlyList<long>? rows)
    {
        if (rows is null || rows.Count == 0)
        {
            throw RefusedException.Invalid("Name the rows by their numbers in the source (1 = first row below the header).", "rows");
        }

        if (rows.FirstOrDefault(r => r < 1 || r > work.Source.Rows) is var wrong && wrong != 0)
        {
            throw RefusedException.Invalid($"There is no row {wrong}; the source has rows 1 to {work.Source.Rows}.", "rows");
        }

        return rows.Contains(0) ? throw RefusedException.Invalid("There is no row 0; the first row below the header is 1.", "rows") : [.. rows.Distinct().Order()];
    }

    private async Task<Work> RowsAsync(Work work, PreparationStep step, CancellationToken cancellation)
    {
        var kept = work.Kept.Select(r => (long)r + 1).ToHashSet();
        var excludes = step.Kind == StepKind.ExcludeRows;
        var useless = step.Rows!.Where(r => kept.Contains(r) != excludes).ToList();
        if (useless.Count > 0)
        {
            throw RefusedException.Invalid($"Row{(useless.Count == 1 ? string.Empty : "s")} {string.Join(", ", useless.Take(20))} {(useless.Count == 1 ? "is" : "are")} {(excludes ? "left out already" : "not left out")}.", "rows");
        }

        var after = await KeptRows.ApplyAsync(columns, work.ProjectId, work.Source, step, work.Dictionary, work.Kept, cancellation);
        return work.With(step with { RowsBefore = work.Kept.Length, RowsAfter = after.Length }, after);
    }

    private async Task<Work> CompleteCasesAsync(Work work, string id, string reason, StepRequest request, CancellationToken cancellation)
    {
        if (request.Variables is null || request.Variables.Count == 0)
        {
            throw RefusedException.Invalid("Name the variables in which a row must be complete.", "variables");
        }

        var ids = request.Variables.Select(v => work.Dictionary.Require(v).VariableId).Distinct(StringComparer.Ordinal).ToList();
        var step = new PreparationStep(id, StepKind.CompleteCases, reason, Variables: ids);
        var complete = await KeptRows.CompleteAsync(columns, work.ProjectId, work.Source, step, work.Dictionary, work.Kept, cancellation);
        return work.With(step with { RowsBefore = work.Kept.Length, RowsAfter = complete.Rows.Length, Losses = complete.Losses }, complete.Rows);
    }

    private async Task<Work> CollapseAsync(Work work, string id, string reason, StepRequest request, CancellationToken cancellation)
    {
        var variable = work.Dictionary.Require(request.Variable ?? throw RefusedException.Invalid("Name the variable whose categories are put together.", "variable"));
        if (variable.Kind is not (VariableKind.Categorical or VariableKind.Ordered or VariableKind.Binary))
        {
            throw RefusedException.Invalid($"'{variable.Name}' is not categorical. Describe it as categorical first; a measured variable is not cut into groups here.", "variable");
        }

        var name = Reasons.Name(request.NewVariable, "newVariable");
        if (work.Dictionary.Find(name) is not null || work.Steps.Any(s => s.NewVariable == name))
        {
            throw RefusedException.Invalid($"There is a variable named '{name}' already. Collapsing makes a new variable and leaves the old one as it is.", "newVariable");
        }

        var categories = work.Contents.Categories(variable.Name);
        var present = categories.Select((c, i) => new IndexedCategory(c, i)).Where(c => !variable.MissingCodes.Contains(c.Name, StringComparer.Ordinal)).ToList();
        var groups = Groups(request.Groups, present);
        var labels = request.Groups!.Select(g => Reasons.Name(g.Label, "label")).ToList();
        if (labels.Distinct(StringComparer.Ordinal).Count() != labels.Count)
        {
            throw RefusedException.Invalid("Two groups have the same label.", "groups");
        }

        var reference = request.Reference is null ? 0 : labels.IndexOf(request.Reference);
        if (reference < 0)
        {
            throw RefusedException.Invalid($"'{request.Reference}' is none of the labels.", "reference");
        }

        var step = new PreparationStep(
            id, StepKind.Collapse, reason, Variable: variable.VariableId, NewVariable: name, Groups: groups, Reference: reference,
            RowsBefore: work.Kept.Length, RowsAfter: work.Kept.Length);
        var column = (await columns.ReadAsync(work.ProjectId, work.Source, work.Dictionary, [variable.Name], cancellation))[0];
        return work.With(step with { Cells = work.Kept.LongCount(r => !column.IsMissing(r)) }, work.Kept, work.Labels.With(id, labels));
    }

    private static IReadOnlyList<IReadOnlyList<int>> Groups(IReadOnlyList<GroupRequest>? requests, IReadOnlyList<IndexedCategory> present)
    {
        if (requests is null || requests.Count < 2)
        {
            throw RefusedException.Invalid("Give at least two groups, each with a label and its categories.", "groups");
        }

        var left = present.ToDictionary(c => c.Name, c => c.Index, StringComparer.Ordinal);
        var groups = new List<IReadOnlyList<int>>();
        foreach (var request in requests)
        {
            if (request.Categories is null || request.Categories.Count == 0)
            {
                throw RefusedException.Invalid($"The group '{request.Label}' has no categories.", "groups");
            }

            var group = new List<int>();
            foreach (var category in request.Categories)
            {
                group.Add(left.Remove(category, out var index)
                    ? index
                    : throw RefusedException.Invalid($"'{category}' is no category of the variable, or stands in two groups. The categories are: {string.Join(", ", present.Select(c => c.Name))}.", "groups"));
            }

            groups.Add(group);
        }

        return left.Count == 0
            ? groups
            : throw RefusedException.Invalid($"A variable is collapsed as a whole: {string.Join(", ", left.Keys)} {(left.Count == 1 ? "is" : "are")} in no group.", "groups");
    }

    private sealed record State(DataDictionary Dictionary, SourceView Source);

    private sealed record IndexedCategory(string Name, int Index);

    private sealed record Work(
        string ProjectId, DataDictionary Dictionary, SourceView Source, SourceContents Contents, IReadOnlyList<PreparationStep> Steps, CategoryLabels Labels, int[] Kept)
    {
        public Work With(PreparationStep step, int[] kept, CategoryLabels? labels = null) =>
            this with { Steps = [.. Steps, step], Kept = kept, Labels = labels ?? Labels };
    }
}
