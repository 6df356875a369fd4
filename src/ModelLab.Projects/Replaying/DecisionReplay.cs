using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Replaying;

/// <summary>Whether a revision is what its decision makes of the one before.</summary>
internal static class DecisionReplay
{
    /// <summary>Compares number, terms and preparation with those that the decision gives.</summary>
    public static void CompareTerms(IReadModel model, RevisionMade revision, RevisionMade? before, List<string> problems)
    {
        if (revision.Number != (before?.Number ?? 0) + 1)
        {
            problems.Add($"Its number is {revision.Number}; it is the path's revision {(before?.Number ?? 0) + 1}.");
        }

        if ((before is null) != (revision.Decision.Kind == DecisionKind.Start))
        {
            problems.Add(before is null ? "The path begins with another decision than its start." : "The path starts twice.");
            return;
        }

        if (!Possible(model, revision, before).Any(terms => terms.SequenceEqual(revision.Terms)))
        {
            problems.Add("The terms of the model are not those that the decision gives.");
        }

        ComparePreparation(model, revision, before, problems);
    }

    private static IEnumerable<IEnumerable<Term>> Possible(IReadModel model, RevisionMade revision, RevisionMade? before)
    {
        var path = model.Find<PathView>(revision.PathId)!;
        var decision = revision.Decision;
        switch (decision.Kind)
        {
            case DecisionKind.Remove:
                yield return before!.Terms.Where(t => !t.Equals(decision.Term));
                break;
            case DecisionKind.Add:
                // In whatever place the term came in.
                yield return revision.Terms.Count == before!.Terms.Count + 1 ? revision.Terms.Where(t => t.Equals(decision.Term) != before.Terms.Contains(t)) : [];
                break;
            case DecisionKind.ExcludeRows or DecisionKind.RestoreRows:
                yield return before!.Terms;
                break;
            default:
                if (decision.FromRevisionId is { } from)
                {
                    yield return model.Find<RevisionView>(from)?.Terms ?? [];
                }

                // A side path may begin with candidates of its own; a path run again begins as the old one did.
                if (decision.FromRevisionId is null || decision.Kind == DecisionKind.Start)
                {
                    yield return path.Plan.Candidates;
                }

                if (path.AgainOfPathId is { } again)
                {
                    yield return model.All<RevisionView>().FirstOrDefault(r => r.PathId == again && r.Number == revision.Number)?.Terms ?? [];
                }

                break;
        }
    }

    private static void ComparePreparation(IReadModel model, RevisionMade revision, RevisionMade? before, List<string> problems)
    {
        var decision = revision.Decision;
        if (decision.Kind is DecisionKind.ExcludeRows or DecisionKind.RestoreRows)
        {
            var step = revision.PreparationId is null ? null : model.Find<PreparationView>(revision.PreparationId)?.Steps[^1];
            var kind = decision.Kind == DecisionKind.ExcludeRows ? StepKind.ExcludeRows : StepKind.RestoreRows;
            if (step is null || step.Kind != kind || step.Cause != decision.Cause || !step.Rows!.SequenceEqual(decision.Rows ?? []))
            {
                problems.Add("The rows of the decision are not those of the preparation's last step.");
            }
        }
        else if (revision.PreparationId != (before is null ? model.Find<PathView>(revision.PathId)!.Plan.PreparationId : before.PreparationId))
        {
            problems.Add("The preparation changes without a decision about rows.");
        }
    }
}
