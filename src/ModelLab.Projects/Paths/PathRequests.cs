using ModelLab.Projects.Entries;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Paths;

/// <summary>What starts a path. For a side path, what is null is taken from the path of <paramref name="FromRevisionId"/>.</summary>
/// <param name="Name">Name of the path.</param>
/// <param name="DatasetId">The dataset.</param>
/// <param name="PreparationId">The preparation, or null: all rows.</param>
/// <param name="Outcome">The outcome.</param>
/// <param name="Terms">All candidate terms.</param>
/// <param name="Intercept">Whether the models have an intercept; true by default.</param>
/// <param name="HeldIn">Terms that stay.</param>
/// <param name="Rule">Choosing rule, or null.</param>
/// <param name="Covariance"><c>classical</c>, the only one offered yet.</param>
/// <param name="Confidence">Level of the intervals; 0.95 by default.</param>
/// <param name="FromRevisionId">For a side path: the revision that it leaves.</param>
/// <param name="OutcomeReason">Why a binary or count outcome is modelled by least squares all the same.</param>
/// <param name="Reason">Why.</param>
public sealed record StartRequest(
    string? Name, string? DatasetId, string? PreparationId, string? Outcome, IReadOnlyList<Term>? Terms, bool? Intercept, IReadOnlyList<Term>? HeldIn,
    RuleRecord? Rule, string? Covariance, double? Confidence, string? FromRevisionId, string? OutcomeReason, string? Reason);

/// <summary>A decision on a path.</summary>
/// <param name="Kind">What: remove, add, restart, excludeRows, restoreRows.</param>
/// <param name="Term">The term for remove and add.</param>
/// <param name="Rows">Row numbers for excludeRows and restoreRows.</param>
/// <param name="Cause">Cause for excludeRows.</param>
/// <param name="FromRevisionId">For restart: the revision of this path whose terms are taken up; null: all candidates.</param>
/// <param name="Reason">Why.</param>
/// <param name="After">Id of the last revision that the caller has seen.</param>
public sealed record DecisionRequest(
    DecisionKind? Kind, Term? Term, IReadOnlyList<long>? Rows, ExclusionCause? Cause, string? FromRevisionId, string? Reason, string? After)
{
    /// <summary>Refuses a member that has no meaning for the kind of decision: it would be ignored, and the person believe otherwise.</summary>
    public void RequireOnlyWhatBelongs()
    {
        var rows = Kind is DecisionKind.ExcludeRows or DecisionKind.RestoreRows;
        RequireAbsent(Term is not null && Kind is not (DecisionKind.Remove or DecisionKind.Add), "term");
        RequireAbsent(Rows is not null && !rows, "rows");
        RequireAbsent(Cause is not null && Kind != DecisionKind.ExcludeRows, "cause");
        RequireAbsent(FromRevisionId is not null && Kind != DecisionKind.Restart, "fromRevisionId");

        static void RequireAbsent(bool stray, string member)
        {
            if (stray)
            {
                throw RefusedException.Invalid($"'{member}' has no meaning for this kind of decision. Leave it out, or send it with the decision that it belongs to.", member);
            }
        }
    }
}

/// <summary>The rule run to its end.</summary>
/// <param name="Reason">Why.</param>
/// <param name="After">Id of the last revision that the caller has seen.</param>
public sealed record ChooseRequest(string? Reason, string? After);
