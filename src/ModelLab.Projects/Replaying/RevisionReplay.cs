using ModelLab.Projects.Entries;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Replaying;

/// <summary>Fits revisions again, in the order of the ledger, and compares all that their entries say.</summary>
internal sealed class RevisionReplay(string projectId, RecordedProject record, ISourceVault vault, DatasetColumns columns)
{
    private readonly AnalysisDataLoader loader = new(record.Model, vault, columns);
    private readonly Dictionary<string, AnalysisData> loaded = new(StringComparer.Ordinal);
    private readonly Dictionary<string, PathSoFar> paths = new(StringComparer.Ordinal);

    /// <summary>Replays the next revision.</summary>
    public async Task<ReplayedRevision> ReplayAsync(RecordedRevision recorded, CancellationToken cancellation)
    {
        var revision = recorded.Body;
        var before = paths.GetValueOrDefault(revision.PathId);
        var problems = new List<string>();
        FittedRevision? again = null;
        double? difference = null;
        try
        {
            var plan = record.Model.Find<PathView>(revision.PathId)!.Plan;
            DecisionReplay.CompareTerms(record.Model, revision, before?.Body, problems);
            var data = await LoadAsync(plan, revision, cancellation);
            await CompareRowsAsync(revision, data, problems, cancellation);
            again = await Task.Run(() => RevisionFitter.Fit(data, plan, revision.Terms), cancellation);
            if (MadeByTheSameMethods(revision) && again.Fingerprint != revision.Fingerprint)
            {
                problems.Add("What the figures depend on is not the same.");
            }

            difference = Compare(revision, again, before, plan, problems);
            var found = FindingRules.LookAgain(new RevisionEvidence(revision.RevisionId, revision.Terms, again.Figures, data.Dictionary), revision.Methods);
            CompareFindings(recorded, found, before?.Findings ?? [], problems);
        }
        catch (Exception e) when (Unreadable.Is(e))
        {
            problems.Add(Unreadable.Problem(e));
        }

        paths[revision.PathId] = new PathSoFar(
            revision, again, FindingsReview.After(before?.Findings ?? [], [.. recorded.Gone.Select(g => new People.Act(g)), .. recorded.Raised.Select(r => new People.Act(r))]));
        return new ReplayedRevision(
            revision.RevisionId, revision.PathId, revision.Number, problems.Count == 0 && difference == 0, difference, problems);
    }

    private async Task<AnalysisData> LoadAsync(PathPlan plan, RevisionMade revision, CancellationToken cancellation)
    {
        var key = $"{revision.PathId}/{revision.PreparationId}";
        if (!loaded.TryGetValue(key, out var data))
        {
            var preparation = revision.PreparationId is null ? null : record.Model.Find<PreparationView>(revision.PreparationId) ?? throw RefusedException.NotFound("such preparation");
            loaded[key] = data = await loader.LoadAsync(projectId, plan, preparation, cancellation);
        }

        return data;
    }

    private async Task CompareRowsAsync(RevisionMade revision, AnalysisData data, List<string> problems, CancellationToken cancellation)
    {
        if (FigureComparison.LargestRelativeDifference(revision.Rows, data.Facts) != 0)
        {
            problems.Add(
                data.Facts.Hash == revision.Rows.Hash && data.Facts.Count == revision.Rows.Count
                    ? "What missing values cost is not what is recorded."
                    : $"The rows analysed are not the same: {data.Facts.Count} now, {revision.Rows.Count} recorded.");
        }

        var kept = await vault.ReadContentAsync(projectId, revision.Rows.Hash, cancellation);
        if (!kept.AsSpan().SequenceEqual(data.RowsContent.Plain))
        {
            problems.Add("The list of rows that was kept is not that of the rows analysed.");
        }
    }

    private static bool MadeByTheSameMethods(RevisionMade revision) =>
        revision.Methods.Take(RevisionFitter.Methods.Count).SequenceEqual(RevisionFitter.Methods, StringComparer.Ordinal);

    private static double? Compare(RevisionMade revision, FittedRevision again, PathSoFar? before, PathPlan plan, List<string> problems)
    {
        var figures = FigureComparison.LargestRelativeDifference(
            new ComparedFigures(revision.Figures, revision.FullModelMeanSquare), new ComparedFigures(again.Figures, again.FullModelMeanSquare),
            laterFigures: !MadeByTheSameMethods(revision));
        Tell(figures, "The figures", problems);
        if (revision.Decision.Kind != DecisionKind.Remove)
        {
            return figures;
        }

        if (before?.Fitted is not { } previous)
        {
            problems.Add("The evidence for the removal cannot be computed: the revision before it is not there.");
            return figures;
        }

        var expected = DecisionTerms.Evidence(previous.Figures, revision.Decision.Term!);
        var evidence = FigureComparison.LargestRelativeDifference(revision.Decision.Evidence, expected);
        Tell(evidence, "The figures of the term removed, in the revision before,", problems);
        CompareRule(revision, previous, plan, problems);
        return figures is null || evidence is null ? null : Math.Max(figures.Value, evidence.Value);
    }

    private static void CompareRule(RevisionMade revision, FittedRevision previous, PathPlan plan, List<string> problems)
    {
        var decision = revision.Decision;
        if ((decision.RuleSays is null && !decision.ByRule) || !revision.Methods.Contains(BackwardElimination.MethodVersion, StringComparer.Ordinal))
        {
            return;
        }

        if (plan.Rule is null)
        {
            problems.Add("The decision is recorded as the rule's, and the path has none.");
            return;
        }

        var choice = BackwardElimination.Choose(previous.Results, plan.Rule.ToRule());
        if (choice.Explanation != decision.RuleSays)
        {
            problems.Add($"The rule says something else of the revision before: {choice.Explanation}");
        }

        if (decision.ByRule && !(choice.Remove && choice.Weakest!.Term.Equals(decision.Term)))
        {
            problems.Add($"The rule does not remove {decision.Term} here.");
        }
    }

    private static void CompareFindings(
        RecordedRevision recorded, IReadOnlyList<FindingRecord> found, IReadOnlyList<StandingFinding> standing, List<string> problems)
    {
        var ids = new Queue<string>(recorded.Raised.Select(r => r.FindingId));
        var expected = FindingsReview.Acts(standing, found, () => ids.TryDequeue(out var id) ? id : string.Empty).Select(a => a.Body).ToList();
        if (!expected.OfType<FindingGone>().SequenceEqual(recorded.Gone))
        {
            problems.Add("The findings whose cause is recorded as gone are not those whose cause is gone.");
        }

        if (FigureComparison.LargestRelativeDifference(expected.OfType<FindingRaised>().ToList(), [.. recorded.Raised]) != 0)
        {
            problems.Add("The findings recorded are not those that the rules find.");
        }
    }

    private static void Tell(double? difference, string what, List<string> problems)
    {
        if (difference is null)
        {
            problems.Add($"{what} do not have the same form.");
        }
        else if (difference > ReplayProject.Tolerance)
        {
            problems.Add(string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{what} differ, relatively by up to {difference:G3}."));
        }
    }

    private sealed record PathSoFar(RevisionMade Body, FittedRevision? Fitted, IReadOnlyList<StandingFinding> Findings);
}
