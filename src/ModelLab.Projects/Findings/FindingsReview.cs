using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Findings;

/// <summary>Compares the findings at a new revision with those that stand on its path.</summary>
public static class FindingsReview
{
    /// <summary>
    /// The acts that bring the path's findings up to date: new ones raised, those whose cause is gone marked so. A finding that
    /// was accepted stays accepted while its cause stays.
    /// </summary>
    /// <param name="standing">Findings of the path that are open or accepted.</param>
    /// <param name="found">Findings at the new revision.</param>
    /// <param name="newId">Gives ids.</param>
    public static IReadOnlyList<Act> Acts(IReadOnlyList<StandingFinding> standing, IReadOnlyList<FindingRecord> found, Func<string> newId)
    {
        var acts = new List<Act>();
        acts.AddRange(standing.Where(s => !found.Any(f => Same(s.Finding, f))).Select(s => new Act(new FindingGone(s.Id))));
        acts.AddRange(found.Where(f => !standing.Any(s => Same(s.Finding, f))).Select(f => new Act(new FindingRaised(newId(), f))));
        return acts;
    }

    /// <summary>The findings that stand on a path: open or accepted, raised at one of its revisions.</summary>
    public static IReadOnlyList<StandingFinding> OnPath(IReadModel model, string pathId)
    {
        var revisions = model.All<RevisionView>().Where(r => r.PathId == pathId).Select(r => r.Id).ToHashSet(StringComparer.Ordinal);
        return
        [
            .. model.All<FindingView>()
                .Where(f => f.State != FindingState.Gone && revisions.Contains(f.Finding.Place.Id))
                .Select(f => new StandingFinding(f.Id, f.Finding)),
        ];
    }

    /// <summary>The findings that stand, or stood, at a revision of a path: raised there or before, their cause not gone by then.</summary>
    public static IEnumerable<FindingView> AtRevision(IReadModel model, string pathId, int number)
    {
        var revisions = model.All<RevisionView>().Where(r => r.PathId == pathId).ToDictionary(r => r.Id, StringComparer.Ordinal);
        return model.All<FindingView>().Where(f =>
            revisions.TryGetValue(f.Finding.Place.Id, out var raised) && raised.Number <= number
            && !(f.State == FindingState.Gone && revisions.Values.Where(r => r.EntryNumber < f.ChangedEntry).Max(r => r.Number) <= number));
    }

    /// <summary>The findings that stand after acts were taken.</summary>
    public static IReadOnlyList<StandingFinding> After(IReadOnlyList<StandingFinding> standing, IEnumerable<Act> acts)
    {
        var gone = acts.Select(a => a.Body).OfType<FindingGone>().Select(g => g.FindingId).ToHashSet(StringComparer.Ordinal);
        return
        [
            .. standing.Where(s => !gone.Contains(s.Id)),
            .. acts.Select(a => a.Body).OfType<FindingRaised>().Select(r => new StandingFinding(r.FindingId, r.Finding)),
        ];
    }

    private static bool Same(FindingRecord a, FindingRecord b) => a.Rule == b.Rule && a.Subject.SequenceEqual(b.Subject, StringComparer.Ordinal);
}

/// <summary>A finding that stands on a path.</summary>
public sealed record StandingFinding(string Id, FindingRecord Finding);
