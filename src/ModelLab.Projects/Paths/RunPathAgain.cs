using System.Text.Json;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Paths;

/// <summary>A path to be run again on another dataset.</summary>
/// <param name="Name">Name of the new path.</param>
/// <param name="DatasetId">A dataset that corrects the one of the old path, directly or through others.</param>
/// <param name="Reason">Why.</param>
public sealed record AgainRequest(string? Name, string? DatasetId, string? Reason);

/// <summary>Runs a path again on a corrected dataset: the same decisions in the same order, each refitted. The old path stays as it is.</summary>
public sealed class RunPathAgain(ProjectGate gate, IProjectStore store, ISourceVault vault, AnalysisDataLoader loader, PathDesk desk, PreparationBuilder preparations)
{
    /// <summary>Runs it and returns the id of the new path.</summary>
    /// <exception cref="RefusedException">A decision no longer holds on the corrected data; names it. Nothing was stored.</exception>
    public async Task<string> ExecuteAsync(Caller caller, string projectId, string pathId, AgainRequest request, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Analyst, cancellation);
        var reason = Reasons.Require(request.Reason);
        var name = Reasons.Name(request.Name, "name");
        var old = await store.ReadAsync(projectId, m => Read(m, pathId, request.DatasetId), cancellation);
        var plan = old.Path.Plan with { DatasetId = old.Dictionary.Dataset.Id, DictionaryEntry = old.Dictionary.Entry, PreparationId = null };
        var run = new Run(projectId, old, []);
        if (old.Path.Plan.PreparationId is { } preparationId)
        {
            await CarryPreparationAsync(run, preparationId, cancellation);
            plan = plan with { PreparationId = run.Preparation!.Id };
        }

        PathPlans.Check(plan);
        PathPlans.QuestionOutcome(plan, old.Dictionary, await SourceContents.OpenAsync(vault, projectId, old.Dictionary.Dataset, cancellation));
        var path = new PathView(gate.NewId(), name, plan, null, pathId, reason, gate.Clock.GetUtcNow(), admission.Author, null, 0);
        run.Acts.Add(new Act(new PathStarted(path.Id, name, plan, null, pathId), reason));
        run.Standing = new PathStanding(path, null, run.Preparation, []);
        foreach (var revision in old.Revisions)
        {
            await StepAsync(run, revision, cancellation);
        }

        await gate.RecordAsync(admission, run.Acts, model => StartPath.RequireFreeName(model, name), cancellation, [.. run.Contents.DistinctBy(c => c.Hash)]);
        return path.Id;
    }

    private async Task StepAsync(Run run, RevisionView revision, CancellationToken cancellation)
    {
        var standing = run.Standing!;
        try
        {
            if (revision.Decision.Kind is DecisionKind.ExcludeRows or DecisionKind.RestoreRows)
            {
                await CarryPreparationAsync(run, revision.PreparationId!, cancellation);
            }

            run.Data ??= await loader.LoadAsync(run.ProjectId, standing.Path.Plan, run.Preparation, run.Labels, cancellation);
            var formed = await Task.Run(() => desk.Form(standing with { Preparation = run.Preparation }, run.Data, Decision(run, revision), revision.Terms), cancellation);
            run.Acts.AddRange(formed.Acts);
            run.Contents.Add(run.Data.RowsContent);
            run.RevisionIds[revision.Id] = formed.Body.RevisionId;
            run.Standing = formed.After;
            run.Results = formed.Fitted.Results;
        }
        catch (RefusedException refused)
        {
            throw new RefusedException(
                refused.Kind,
                $"The decision of revision {revision.Number} ({JsonNamingPolicy.CamelCase.ConvertName(revision.Decision.Kind.ToString())}{(revision.Decision.Term is { } term ? $" {term}" : string.Empty)}) no longer holds on the corrected data: {refused.Message} Nothing was stored.",
                refused.Details);
        }
    }

    private static DecisionRecord Decision(Run run, RevisionView revision)
    {
        var decision = revision.Decision;
        var rule = decision.ByRule ? Rule(run) : null;
        return decision with
        {
            // The old rule's decision is carried over all the same; that the rule took it is said only where it would take it on these data too.
            ByRule = rule is { Remove: true } && decision.Term!.Equals(rule.Weakest?.Term),
            Evidence = decision.Kind == DecisionKind.Remove ? DecisionTerms.Evidence(run.Standing!.Last!.Figures, decision.Term!) : null,
            FromRevisionId = decision.FromRevisionId is { } from ? run.RevisionIds.GetValueOrDefault(from) : null,
            RuleSays = rule?.Explanation,
        };
    }

    /// <summary>What the path's rule says of the model before a step, on the data on which the path runs now.</summary>
    private static EliminationChoice Rule(Run run)
    {
        var rule = run.Standing!.Path.Plan.Rule!;
        return BackwardElimination.Choose(run.Results!, new ChoosingRule(rule.Criterion, rule.RemoveAbove));
    }

    /// <summary>Makes the preparation of an old revision once more on the new dataset, categories taken by name.</summary>
    private async Task CarryPreparationAsync(Run run, string preparationId, CancellationToken cancellation)
    {
        if (run.PreparationIds.TryGetValue(preparationId, out var known) && known == run.Preparation?.Id)
        {
            return;
        }

        var old = await store.ReadAsync(run.ProjectId, m => OldPreparation.Read(m, preparationId), cancellation);
        RequireSameRows(old, run.Old.Dictionary.Dataset);
        var labels = await CategoryLabels.OpenAsync(vault, run.ProjectId, old.Preparation, cancellation);
        var contents = await SourceContents.OpenAsync(vault, run.ProjectId, old.Dictionary.Dataset, cancellation);
        var steps = old.Preparation.Steps.Select(s => Again(s, labels, old.Dictionary, contents)).ToList();
        var built = await preparations.BuildAsync(run.ProjectId, run.Old.Dictionary.Dataset.Id, run.Old.Dictionary.Entry, null, steps, cancellation);
        run.Acts.Add(built.Act(old.Preparation.Steps[^1].Reason));
        run.Preparation = built.AsView(gate.Clock.GetUtcNow());
        run.PreparationIds[preparationId] = run.Preparation.Id;
        run.Labels = built.Labels;
        run.Data = null;
    }

    /// <summary>Rows are left out by number. Where rows came or went, a number may name another row, which must not be left out in silence.</summary>
    private static void RequireSameRows(OldPreparation old, DatasetView corrected)
    {
        var before = old.Dictionary.Dataset.Rows;
        if (before != corrected.Rows && old.Preparation.Steps.Any(s => s.Kind is StepKind.ExcludeRows or StepKind.RestoreRows))
        {
            throw RefusedException.Invalid(
                $"The path leaves out rows by their numbers, and the corrected file has {corrected.Rows} rows where the earlier one had {before}: a number may name another row now. "
                + "Start a new path on the corrected dataset and leave the rows out there.",
                "datasetId");
        }
    }

    private static StepRequest Again(PreparationStep step, CategoryLabels labels, DataDictionary dictionary, SourceContents contents)
    {
        if (step.Kind != StepKind.Collapse)
        {
            return new StepRequest(step.Kind, step.Reason, step.Rows, step.Cause, Variables: step.Variables);
        }

        var variable = dictionary.Require(step.Variable!).Name;
        var categories = contents.Categories(variable);
        var names = labels.Of(step.Id);
        return new StepRequest(
            step.Kind, step.Reason, Variable: variable, NewVariable: step.NewVariable,
            Groups: [.. step.Groups!.Select((g, i) => new GroupRequest(names[i], [.. g.Select(c => categories[c])]))],
            Reference: names[step.Reference ?? 0]);
    }

    private static OldPath Read(IReadModel model, string pathId, string? datasetId)
    {
        var path = model.Find<PathView>(pathId) ?? throw RefusedException.NotFound("such path");
        var dataset = model.Find<DatasetView>(datasetId ?? string.Empty) ?? throw RefusedException.NotFound("such dataset");
        for (var earlier = dataset; earlier.Id != path.Plan.DatasetId;)
        {
            earlier = earlier.PreviousDatasetId is null
                ? throw RefusedException.Invalid("This dataset does not correct the one of the path. Upload the corrected file with previousDatasetId, so that its columns and description are carried over.", "datasetId")
                : model.Find<DatasetView>(earlier.PreviousDatasetId)!;
        }

        return new OldPath(path, DataDictionary.At(model, dataset), [.. model.All<RevisionView>().Where(r => r.PathId == pathId).OrderBy(r => r.Number)]);
    }

    private sealed record OldPath(PathView Path, DataDictionary Dictionary, IReadOnlyList<RevisionView> Revisions);

    private sealed record OldPreparation(PreparationView Preparation, DataDictionary Dictionary)
    {
        public static OldPreparation Read(IReadModel model, string id)
        {
            var preparation = model.Find<PreparationView>(id)!;
            return new OldPreparation(preparation, DataDictionary.At(model, model.Find<DatasetView>(preparation.DatasetId)!, preparation.DictionaryEntry));
        }
    }

    private sealed record Run(string ProjectId, OldPath Old, List<Act> Acts)
    {
        public List<KeptContent> Contents { get; } = [];

        public Dictionary<string, string> RevisionIds { get; } = new(StringComparer.Ordinal);

        public Dictionary<string, string> PreparationIds { get; } = new(StringComparer.Ordinal);

        public PathStanding? Standing { get; set; }

        public ModelResults? Results { get; set; }

        public PreparationView? Preparation { get; set; }

        public CategoryLabels? Labels { get; set; }

        public AnalysisData? Data { get; set; }
    }
}
