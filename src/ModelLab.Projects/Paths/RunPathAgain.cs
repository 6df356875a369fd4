using System.Text.Json;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Paths;

/// <summary>A path to be run again on another dataset.</summary>
/// <param name="Name">Name of the new path.</param>
/// <param name="DatasetId">A dataset that corrects the one of the old path, directly or through others.</param>
/// <param name="Reason">Why.</param>
public sealed record AgainRequest(string? Name, string? DatasetId, string? Reason);

/// <summary>Runs a path again on a corrected dataset: the same decisions in the same order, each refitted. The old path stays as it is.</summary>
public sealed class RunPathAgain(ProjectGate gate, IProjectStore store, ISourceVault vault, AnalysisDataLoader loader, PathDesk desk, PreparationBuilder preparations, CarriedRows carried)
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
            await HoldsAsync("The preparation at the start", () => CarryPreparationAsync(run, preparationId, cancellation));
            plan = plan with { PreparationId = run.Preparation!.Id };
        }

        PathPlans.Check(plan);
        var path = new PathView(gate.NewId(), name, plan, null, pathId, reason, gate.Clock.GetUtcNow(), admission.Author, null, 0);
        run.Acts.Add(new Act(new PathStarted(path.Id, name, plan, null, pathId), reason));
        run.Standing = new PathStanding(path, null, run.Preparation, []);
        run.Data = await loader.LoadAsync(projectId, plan, run.Preparation, run.Labels, cancellation);
        OutcomeQuestion.Ask(plan, run.Data);
        foreach (var revision in old.Revisions)
        {
            await HoldsAsync(Describe(revision), () => StepAsync(run, revision, cancellation));
        }

        await gate.RecordAsync(admission, run.Acts, model => StartPath.RequireFreeName(model, name), cancellation, [.. run.Contents.DistinctBy(c => c.Hash)]);
        return path.Id;
    }

    private async Task StepAsync(Run run, RevisionView revision, CancellationToken cancellation)
    {
        if (revision.Decision.Kind is DecisionKind.ExcludeRows or DecisionKind.RestoreRows)
        {
            await CarryPreparationAsync(run, revision.PreparationId!, cancellation);
        }

        run.Data ??= await loader.LoadAsync(run.ProjectId, run.Standing!.Path.Plan, run.Preparation, run.Labels, cancellation);
        var standing = run.Standing! with { Preparation = run.Preparation };
        var formed = await Task.Run(() => desk.Form(standing, run.Data, Decision(run, revision.Decision), revision.Terms), cancellation);
        run.Acts.AddRange(formed.Acts);
        run.Contents.Add(run.Data.RowsContent);
        run.RevisionIds[revision.Id] = formed.Body.RevisionId;
        run.Standing = formed.After;
        run.Last = formed.Fitted;
    }

    private static async Task HoldsAsync(string what, Func<Task> act)
    {
        try
        {
            await act();
        }
        catch (RefusedException refused)
        {
            throw new RefusedException(refused.Kind, $"{what} no longer holds on the corrected data: {refused.Message} Nothing was stored.", refused.Details);
        }
    }

    private static string Describe(RevisionView revision) =>
        $"The decision of revision {revision.Number} ({JsonNamingPolicy.CamelCase.ConvertName(revision.Decision.Kind.ToString())}{(revision.Decision.Term is { } term ? $" {term}" : string.Empty)})";

    /// <summary>
    /// The old decision with the evidence of the new data. What the rule had decided is repeated by a person; it counts as the rule's
    /// only where the rule decides the same here.
    /// </summary>
    private static DecisionRecord Decision(Run run, DecisionRecord old)
    {
        var removes = old.Kind == DecisionKind.Remove;
        var says = removes && old.ByRule ? BackwardElimination.Choose(run.Last!.Results, run.Standing!.Path.Plan.Rule!.ToRule()) : null;
        return old with
        {
            ByRule = says is { Remove: true } && says.Weakest!.Term.Equals(old.Term),
            Evidence = removes ? DecisionTerms.Evidence(run.Standing!.Last!.Figures, old.Term!) : null,
            FromRevisionId = old.FromRevisionId is { } from ? run.RevisionIds.GetValueOrDefault(from) : null,
            RuleSays = says?.Explanation,
        };
    }

    /// <summary>Makes the preparation of an old revision once more on the new dataset, categories taken by name.</summary>
    private async Task CarryPreparationAsync(Run run, string preparationId, CancellationToken cancellation)
    {
        var old = await store.ReadAsync(run.ProjectId, m => m.Find<PreparationView>(preparationId)!, cancellation);
        await carried.RequireSameAsync(run.ProjectId, old, run.Old.Before, run.Old.Now, cancellation);
        var steps = await RepeatedSteps.OfAsync(store, vault, run.ProjectId, old, run.Old.Dictionary, cancellation);
        var built = await preparations.BuildAsync(run.ProjectId, run.Old.Dictionary.Dataset.Id, run.Old.Dictionary.Entry, null, steps, cancellation);
        run.Acts.Add(built.Act(old.Steps[^1].Reason));
        run.Preparation = built.AsView(gate.Clock.GetUtcNow());
        run.Labels = built.Labels;
        run.Data = null;
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

        return new OldPath(path, Table(model, model.Find<DatasetView>(path.Plan.DatasetId)!, path.Plan.DictionaryEntry), Table(model, dataset, null), [.. model.All<RevisionView>().Where(r => r.PathId == pathId).OrderBy(r => r.Number)]);
    }

    private static ReadTable Table(IReadModel model, DatasetView dataset, long? entry) =>
        new(DataDictionary.At(model, dataset, entry), model.Find<SourceView>(dataset.SourceId)!);

    private sealed record OldPath(PathView Path, ReadTable Before, ReadTable Now, IReadOnlyList<RevisionView> Revisions)
    {
        public DataDictionary Dictionary => Now.Dictionary;
    }

    private sealed record Run(string ProjectId, OldPath Old, List<Act> Acts)
    {
        public List<KeptContent> Contents { get; } = [];

        public Dictionary<string, string> RevisionIds { get; } = new(StringComparer.Ordinal);

        public PathStanding? Standing { get; set; }

        public PreparationView? Preparation { get; set; }

        public CategoryLabels? Labels { get; set; }

        public AnalysisData? Data { get; set; }

        public FittedRevision? Last { get; set; }
    }
}
