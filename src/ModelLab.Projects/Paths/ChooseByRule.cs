using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Revisions;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Paths;

/// <summary>What the rule did.</summary>
/// <param name="Revisions">The revisions added, in order; none where the rule stops at once.</param>
/// <param name="Ending">Why it stopped, with the number that decided.</param>
public sealed record ChosenByRule(IReadOnlyList<RevisionReading> Revisions, string Ending);

/// <summary>Runs the path's rule to its end: one term at a time, a refit and a revision a step, all recorded together.</summary>
public sealed class ChooseByRule(ProjectGate gate, AnalysisDataLoader loader, PathDesk desk, RevisionReader reader)
{
    /// <summary>Runs it.</summary>
    /// <exception cref="RefusedException">The path has no rule, or went on meanwhile; nothing was stored.</exception>
    public async Task<ChosenByRule> ExecuteAsync(
        Caller caller, string projectId, string pathId, ChooseRequest request, bool preview, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Analyst, cancellation);
        var reason = preview && string.IsNullOrWhiteSpace(request.Reason) ? "preview" : Reasons.Require(request.Reason);
        var standing = await desk.StandingAsync(projectId, pathId, request.After, cancellation);
        var record = standing.Path.Plan.Rule
            ?? throw RefusedException.Invalid("This path has no choosing rule: people decide each step. Start a path or side path with a rule.", "rule");
        var data = await loader.LoadAsync(projectId, standing.Path.Plan, standing.Preparation, cancellation);
        var chosen = await Task.Run(() => Run(standing, data, record.ToRule(), reason, cancellation), cancellation);
        if (!preview)
        {
            var run = new RuleRun(pathId, request.After!, [.. chosen.Revisions.Select(r => r.Body.RevisionId)], chosen.Ending);
            await gate.RecordAsync(
                admission,
                [.. chosen.Revisions.SelectMany(r => r.Acts), new Act(run, reason)],
                m => PathDesk.RequireAfter(m, pathId, request.After),
                cancellation,
                [data.RowsContent]);
        }

        var readings = preview
            ? await reader.PreviewAsync(projectId, chosen.Revisions, null, cancellation)
            : await reader.ReadAsync(projectId, chosen.Revisions.Select(r => r.Body.RevisionId), cancellation);
        return new ChosenByRule(readings, chosen.Ending);
    }

    private Chain Run(PathStanding standing, AnalysisData data, ChoosingRule rule, string reason, CancellationToken cancellation)
    {
        var formed = new List<FormedRevision>();
        var results = RevisionFitter.Fit(data, standing.Path.Plan, standing.Terms, standing.Last!.FullModelMeanSquare).Results;
        while (true)
        {
            cancellation.ThrowIfCancellationRequested();
            var choice = BackwardElimination.Choose(results, rule);
            if (!choice.Remove)
            {
                return new Chain(formed, choice.Explanation);
            }

            var term = choice.Weakest!.Term;
            var decision = new DecisionRecord(
                DecisionKind.Remove, reason, term, ByRule: true, Evidence: DecisionTerms.Evidence(standing.Last!.Figures, term), RuleSays: choice.Explanation);
            IReadOnlyList<Term> terms = [.. standing.Terms.Where(t => !t.Equals(term))];
            var next = desk.Form(standing, data, decision, terms);
            formed.Add(next);
            standing = next.After;
            results = next.Fitted.Results;
        }
    }

    private sealed record Chain(IReadOnlyList<FormedRevision> Revisions, string Ending);
}
