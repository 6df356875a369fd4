using ModelLab.Projects.Entries;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Revisions;

/// <summary>What a reader must know before reading the figures of a revision.</summary>
public static class RevisionNotices
{
    /// <summary>The notices of a revision of a path, most important first.</summary>
    public static IReadOnlyList<string> For(PathPlan plan, RevisionMade revision, PreparationView? preparation, IReadOnlyList<DecisionRecord> decisionsSoFar)
    {
        var notices = new List<string>();
        if (revision.Figures.Fit.ExactFit)
        {
            notices.Add("The model fits exactly: nothing is left over, so standard errors, t, F and p do not exist.");
        }

        if (decisionsSoFar.Any(d => d.Kind is DecisionKind.Remove or DecisionKind.Add))
        {
            notices.Add("This model was reached by choosing terms on the same rows. Its p values and intervals ignore the choosing and are too good; read them beside those of the full model.");
        }

        var forInfluence = LeftOutForInfluence(preparation);
        if (forInfluence > 0)
        {
            notices.Add($"{forInfluence} row{(forInfluence == 1 ? " was" : "s were")} left out because of {(forInfluence == 1 ? "its" : "their")} influence on the model. A row that fits badly is not wrong for that: report the model with and without.");
        }

        if (!plan.Intercept)
        {
            notices.Add("Without an intercept, R² and F are taken about zero. They do not compare with any model that has an intercept.");
        }

        if (plan.OutcomeReason is { } reason)
        {
            notices.Add($"The outcome is outside what least squares is made for; the team's reason: {reason}");
        }

        notices.Add("Association is not cause. The figures describe these rows; decisions about one person or household need qualified judgement, and local law, ethics approval and professional standards decide what may be done with them.");
        return notices;
    }

    /// <summary>Rows excluded for influence and not brought back since.</summary>
    private static int LeftOutForInfluence(PreparationView? preparation)
    {
        var rows = new HashSet<long>();
        foreach (var step in preparation?.Steps ?? [])
        {
            switch (step)
            {
                case { Kind: StepKind.ExcludeRows, Cause: ExclusionCause.Influence }:
                    rows.UnionWith(step.Rows!);
                    break;
                case { Kind: StepKind.RestoreRows }:
                    rows.ExceptWith(step.Rows!);
                    break;
            }
        }

        return rows.Count;
    }
}
