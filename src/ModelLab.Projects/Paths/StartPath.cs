using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Paths;

/// <summary>Starts a path with its first revision: all candidates, or the terms of the revision that a side path leaves.</summary>
public sealed class StartPath(ProjectGate gate, IProjectStore store, AnalysisDataLoader loader, PathDesk desk)
{
    /// <summary>Starts it and returns its id.</summary>
    /// <exception cref="RefusedException">The plan does not hold, or the model cannot be fitted; nothing was stored.</exception>
    public async Task<string> ExecuteAsync(Caller caller, string projectId, StartRequest request, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Analyst, cancellation);
        var reason = Reasons.Require(request.Reason);
        var name = Reasons.Name(request.Name, "name");
        var start = await store.ReadAsync(projectId, m => Read(m, request), cancellation);
        PathPlans.Check(start.Plan);
        var data = await loader.LoadAsync(projectId, start.Plan, start.Preparation, cancellation);
        OutcomeQuestion.Ask(start.Plan, data);
        var path = new PathView(
            gate.NewId(), name, start.Plan, request.FromRevisionId, null, reason, gate.Clock.GetUtcNow(), admission.Author, null, 0);
        var decision = new DecisionRecord(DecisionKind.Start, reason, FromRevisionId: request.FromRevisionId);
        var formed = await Task.Run(() => desk.Form(new PathStanding(path, null, start.Preparation, []), data, decision, start.Terms), cancellation);
        await gate.RecordAsync(
            admission,
            [new Act(new PathStarted(path.Id, name, start.Plan, request.FromRevisionId, null), reason), .. formed.Acts],
            model => RequireFreeName(model, name),
            cancellation,
            [data.RowsContent]);
        return path.Id;
    }

    /// <summary>Path names are unique in a project, since people speak of paths by name.</summary>
    internal static void RequireFreeName(IReadModel model, string name)
    {
        if (model.All<PathView>().Any(p => string.Equals(p.Name, name, StringComparison.OrdinalIgnoreCase)))
        {
            throw new RefusedException(RefusalKind.Conflict, $"There is a path named '{name}' already. Give this one another name; nothing was stored.");
        }
    }

    private static Start Read(IReadModel model, StartRequest request)
    {
        var from = request.FromRevisionId is null ? null : model.Find<RevisionView>(request.FromRevisionId) ?? throw RefusedException.NotFound("such revision");
        var parent = from is null ? null : model.Find<PathView>(from.PathId)!.Plan;
        if (parent is not null && (request.DatasetId ?? parent.DatasetId) != parent.DatasetId)
        {
            throw RefusedException.Invalid("A side path stays on the dataset of the revision that it leaves. To use another dataset, run the path again on it.", "datasetId");
        }

        var datasetId = request.DatasetId ?? parent?.DatasetId ?? throw RefusedException.Invalid("Name the dataset.", "datasetId");
        var dataset = model.Find<DatasetView>(datasetId) ?? throw RefusedException.NotFound("such dataset");
        var preparationId = request.PreparationId ?? from?.PreparationId;
        var preparation = preparationId is null ? null : model.Find<PreparationView>(preparationId) ?? throw RefusedException.NotFound("such preparation");
        if (preparation is not null && preparation.DatasetId != datasetId)
        {
            throw RefusedException.Invalid("This preparation belongs to another dataset.", "preparationId");
        }

        // A side path keeps its parent's dictionary: same data, another choice. A new path takes the dictionary as it stands.
        var dictionary = DataDictionary.At(model, dataset, parent?.DictionaryEntry);
        var outcome = request.Outcome ?? parent?.Outcome ?? throw RefusedException.Invalid("Name the outcome.", "outcome");
        var plan = new PathPlan(
            datasetId,
            dictionary.Entry,
            preparationId,
            outcome,
            request.Terms ?? parent?.Candidates ?? throw RefusedException.Invalid("Name the candidate terms.", "terms"),
            request.HeldIn ?? parent?.HeldIn ?? [],
            request.Intercept ?? parent?.Intercept ?? true,
            request.Rule ?? parent?.Rule,
            request.Covariance ?? parent?.Covariance ?? "classical",
            request.Confidence ?? parent?.Confidence ?? 0.95,
            OutcomeReason(request, outcome, parent));
        IReadOnlyList<Term> terms = from is null || request.Terms is not null ? plan.Candidates : from.Terms;
        return new Start(plan, preparation, terms);
    }

    // The reason for one outcome says nothing about another.
    private static string? OutcomeReason(StartRequest request, string outcome, PathPlan? parent) =>
        !string.IsNullOrWhiteSpace(request.OutcomeReason) ? Reasons.Text(request.OutcomeReason, "outcomeReason", string.Empty)
        : parent is not null && outcome == parent.Outcome ? parent.OutcomeReason
        : null;

    private sealed record Start(PathPlan Plan, PreparationView? Preparation, IReadOnlyList<Term> Terms);
}
