using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Paths;

/// <summary>Takes one decision on a path: a refit and a revision, and for rows a new preparation, recorded together.</summary>
public sealed class TakeDecision(
    ProjectGate gate, IProjectStore store, AnalysisDataLoader loader, PathDesk desk, PreparationBuilder preparations, RevisionReader reader)
{
    /// <summary>Takes it and returns the new revision; of a preview, the revision that it would give.</summary>
    /// <param name="caller">Who.</param>
    /// <param name="projectId">The project.</param>
    /// <param name="pathId">The path.</param>
    /// <param name="request">What, why, and after which revision.</param>
    /// <param name="preview">Compute and show, store nothing; needs no reason.</param>
    /// <param name="cancellation">Stops the work; nothing is stored then.</param>
    /// <exception cref="RefusedException">The decision cannot be taken, or the path went on meanwhile; nothing was stored.</exception>
    public async Task<RevisionReading> ExecuteAsync(
        Caller caller, string projectId, string pathId, DecisionRequest request, bool preview, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Analyst, cancellation);
        request.RequireOnlyWhatBelongs();
        var reason = preview && string.IsNullOrWhiteSpace(request.Reason) ? "preview" : Reasons.Require(request.Reason);
        var standing = await desk.StandingAsync(projectId, pathId, request.After, cancellation);
        var taken = request.Kind switch
        {
            DecisionKind.Remove => await WithTermsAsync(projectId, standing, Removal(standing, RequireTerm(request), reason), DecisionTerms.Without(standing, RequireTerm(request)), cancellation),
            DecisionKind.Add => await WithTermsAsync(projectId, standing, new DecisionRecord(DecisionKind.Add, reason, request.Term), DecisionTerms.With(standing, RequireTerm(request)), cancellation),
            DecisionKind.Restart => await RestartAsync(projectId, standing, request, reason, cancellation),
            DecisionKind.ExcludeRows or DecisionKind.RestoreRows => await WithRowsAsync(projectId, standing, request, reason, cancellation),
            _ => throw RefusedException.Invalid("A decision is one of remove, add, restart, excludeRows, restoreRows.", "kind"),
        };
        if (preview)
        {
            return (await reader.PreviewAsync(projectId, [taken.Revision], taken.Labels, cancellation))[0];
        }

        await gate.RecordAsync(admission, taken.Acts, m => PathDesk.RequireAfter(m, pathId, request.After), cancellation, [taken.Content]);
        return await reader.ReadAsync(projectId, taken.Revision.Body.RevisionId, cancellation);
    }

    private static Term RequireTerm(DecisionRequest request) =>
        request.Term ?? throw RefusedException.Invalid("Name the term.", "term");

    private static DecisionRecord Removal(PathStanding standing, Term term, string reason) =>
        new(DecisionKind.Remove, reason, term, Evidence: DecisionTerms.Evidence(standing.Last!.Figures, term));

    private async Task<Formed> WithTermsAsync(
        string projectId, PathStanding standing, DecisionRecord decision, IReadOnlyList<Term> terms, CancellationToken cancellation)
    {
        var data = await loader.LoadAsync(projectId, standing.Path.Plan, standing.Preparation, cancellation);
        var formed = await Task.Run(() => desk.Form(standing, data, decision, terms), cancellation);
        return new Formed(formed, formed.Acts, data.RowsContent, null);
    }

    private async Task<Formed> RestartAsync(string projectId, PathStanding standing, DecisionRequest request, string reason, CancellationToken cancellation)
    {
        var terms = standing.Path.Plan.Candidates;
        if (request.FromRevisionId is not null)
        {
            var from = await store.ReadAsync(projectId, m => m.Find<RevisionView>(request.FromRevisionId), cancellation);
            terms = from is not null && from.PathId == standing.Path.Id ? from.Terms : throw RefusedException.Invalid("A restart takes up a revision of its own path.", "fromRevisionId");
        }

        return await WithTermsAsync(projectId, standing, new DecisionRecord(DecisionKind.Restart, reason, FromRevisionId: request.FromRevisionId), terms, cancellation);
    }

    private async Task<Formed> WithRowsAsync(string projectId, PathStanding standing, DecisionRequest request, string reason, CancellationToken cancellation)
    {
        var step = request.Kind == DecisionKind.ExcludeRows
            ? new StepRequest(StepKind.ExcludeRows, reason, request.Rows, request.Cause)
            : new StepRequest(StepKind.RestoreRows, reason, request.Rows);
        var plan = standing.Path.Plan;

        // Earlier steps keep the dictionary under which they were taken: the rows named here are all that changes.
        var built = await preparations.BuildAsync(
            projectId, plan.DatasetId, standing.Preparation?.DictionaryEntry ?? plan.DictionaryEntry, standing.Preparation, [step], cancellation);
        var made = built.AsView(gate.Clock.GetUtcNow());
        var data = await loader.LoadAsync(projectId, plan, made, built.Labels, cancellation);
        var decision = new DecisionRecord(request.Kind!.Value, reason, Rows: built.Body.Steps[^1].Rows, Cause: built.Body.Steps[^1].Cause);
        var formed = await Task.Run(() => desk.Form(standing with { Preparation = made }, data, decision, standing.Terms), cancellation);
        return new Formed(formed, [built.Act(reason), .. formed.Acts], data.RowsContent, built.Labels);
    }

    private sealed record Formed(FormedRevision Revision, IReadOnlyList<Act> Acts, KeptContent Content, CategoryLabels? Labels);
}
