using ModelLab.Projects.Entries;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Paths;

/// <summary>Where a path stands: enough to form its next revision.</summary>
/// <param name="Path">The path, as read.</param>
/// <param name="Last">The last revision as recorded, or null before the first.</param>
/// <param name="Preparation">The preparation in force, or null.</param>
/// <param name="Findings">The findings that stand on it.</param>
public sealed record PathStanding(PathView Path, RevisionMade? Last, PreparationView? Preparation, IReadOnlyList<StandingFinding> Findings)
{
    /// <summary>The terms of the last revision; all candidates before the first.</summary>
    public IReadOnlyList<Term> Terms => Last?.Terms ?? Path.Plan.Candidates;
}

/// <summary>A revision formed but not yet recorded.</summary>
/// <param name="Body">What will be recorded.</param>
/// <param name="Fitted">The fit.</param>
/// <param name="Acts">The revision and the findings that it raises or ends, in order.</param>
/// <param name="After">Where the path stands after it.</param>
public sealed record FormedRevision(RevisionMade Body, FittedRevision Fitted, IReadOnlyList<Act> Acts, PathStanding After);

/// <summary>Forms revisions: the common part of starting a path, deciding, the rule, and running a path again.</summary>
public sealed class PathDesk(ProjectGate gate, IProjectStore store)
{
    /// <summary>Reads where a path stands.</summary>
    /// <param name="projectId">The project.</param>
    /// <param name="pathId">The path.</param>
    /// <param name="after">Id of the last revision that the caller has seen.</param>
    /// <param name="cancellation">Stops the work.</param>
    /// <exception cref="RefusedException">There is no such path, or it went on after that revision.</exception>
    public async Task<PathStanding> StandingAsync(string projectId, string pathId, string? after, CancellationToken cancellation)
    {
        var state = await store.ReadAsync(
            projectId,
            m =>
            {
                RequireAfter(m, pathId, after);
                var path = m.Find<PathView>(pathId)!;
                var last = m.Find<RevisionView>(path.LastRevisionId!)!;
                var preparation = last.PreparationId is null ? null : m.Find<PreparationView>(last.PreparationId);
                return new State(path, last.EntryNumber, preparation, FindingsReview.OnPath(m, pathId));
            },
            cancellation);
        var entry = await store.EntryAsync(projectId, state.LastEntry, cancellation);
        return new PathStanding(state.Path, EntryKinds.Read<RevisionMade>(entry), state.Preparation, state.Findings);
    }

    /// <summary>Fits the next revision of a path and forms what is to be recorded.</summary>
    /// <param name="standing">Where the path stands.</param>
    /// <param name="data">Columns and rows under the preparation in force.</param>
    /// <param name="decision">What leads to it.</param>
    /// <param name="terms">The terms of its model.</param>
    public FormedRevision Form(PathStanding standing, AnalysisData data, DecisionRecord decision, IReadOnlyList<Term> terms)
    {
        var plan = standing.Path.Plan;
        var known = standing.Last is { } last && last.Rows.Hash == data.Facts.Hash ? last.FullModelMeanSquare : null;
        var fitted = RevisionFitter.Fit(data, plan, terms, known);
        var body = new RevisionMade(
            gate.NewId(), standing.Path.Id, (standing.Last?.Number ?? 0) + 1, decision, terms, data.Preparation?.Id,
            data.Facts, fitted.Figures, fitted.FullModelMeanSquare, fitted.Fingerprint, [.. RevisionFitter.Methods, .. FindingRules.Versions]);
        var found = FindingRules.Look(new RevisionEvidence(body.RevisionId, terms, fitted.Figures, data.Dictionary));
        var review = FindingsReview.Acts(standing.Findings, found, gate.NewId);
        var path = standing.Path with { LastRevisionId = body.RevisionId, Revisions = body.Number };
        return new FormedRevision(
            body, fitted, [new Act(body, decision.Reason), .. review],
            new PathStanding(path, body, data.Preparation, FindingsReview.After(standing.Findings, review)));
    }

    /// <summary>Refuses where the path went on after the revision that the caller had seen, and tells what came between.</summary>
    public static void RequireAfter(IReadModel model, string pathId, string? after)
    {
        var path = model.Find<PathView>(pathId) ?? throw RefusedException.NotFound("such path");
        if (path.LastRevisionId == after)
        {
            return;
        }

        var revisions = model.All<RevisionView>().Where(r => r.PathId == pathId).OrderBy(r => r.Number).ToList();
        var seen = revisions.FirstOrDefault(r => r.Id == after);
        if (seen is null)
        {
            throw RefusedException.Invalid("'after' names the id of the last revision of this path that you have seen. It is needed so that nobody decides on an older state.", "after");
        }

        var between = revisions.Where(r => r.Number > seen.Number).ToList();
        throw new RefusedException(
            RefusalKind.Stale,
            $"Since revision {seen.Number}, which you had seen, {(between.Count == 1 ? "a decision was" : $"{between.Count} decisions were")} taken on this path: "
            + string.Join("; ", between.Select(Describe)) + ". Nothing was changed. Look at the last revision and decide again; your reason is still yours to send.",
            [.. between.Select(r => new RefusalDetail(null, r.Id, Describe(r)))]);
    }

    private static string Describe(RevisionView r)
    {
        var act = r.Decision.Kind switch
        {
            DecisionKind.Remove => $"{r.Decision.Term} removed",
            DecisionKind.Add => $"{r.Decision.Term} added",
            DecisionKind.Restart => "restarted",
            DecisionKind.ExcludeRows => "rows excluded",
            DecisionKind.RestoreRows => "rows brought back",
            _ => "started",
        };
        return $"revision {r.Number}, {act} by {r.By.Name} ({r.Decision.Reason})";
    }

    private sealed record State(PathView Path, long LastEntry, PreparationView? Preparation, IReadOnlyList<StandingFinding> Findings);
}
