using System.Globalization;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Paths;

/// <summary>Outcomes that least squares is not made for are questioned, and need a reason.</summary>
public static class OutcomeQuestion
{
    /// <summary>A whole-numbered outcome that begins at 0 or 1 and has at most this many distinct values is questioned as a count (common practice).</summary>
    public const int CountDistinct = 20;

    /// <summary>
    /// Questions a binary or count outcome. All its values count that the dictionary does not declare missing, and those of the rows
    /// analysed by themselves: leaving rows out must not hide what kind of variable it is, nor make it another one unseen.
    /// </summary>
    /// <exception cref="RefusedException">It is one, and no reason is given.</exception>
    public static void Ask(PathPlan plan, AnalysisData data)
    {
        if (plan.OutcomeReason is not null || data.Table.Find(plan.Outcome) is not NumberColumn outcome)
        {
            return;
        }

        var all = Distinct(outcome, Enumerable.Range(0, outcome.Rows));
        var analysed = Distinct(outcome, data.Rows);
        if (all?.Count == 2 || analysed?.Count == 2)
        {
            throw RefusedException.Invalid(
                $"'{plan.Outcome}' has two values. Least squares then gives differences in proportions: fitted values can leave the range, and spread is uneven by nature. "
                + "Logistic regression is the usual method and is not offered here. If you want least squares all the same, say why in 'outcomeReason'.",
                "outcomeReason");
        }

        if ((IsCountLike(all) ? all : IsCountLike(analysed) ? analysed : null) is { } counts)
        {
            throw RefusedException.Invalid(
                string.Create(CultureInfo.InvariantCulture, $"'{plan.Outcome}' looks like a count or a score: whole numbers from {counts.Min} with {counts.Count} distinct values. ")
                + "Least squares can predict impossible values and its spread is likely to grow with the mean; count or ordinal regression is the usual method and is not offered here. "
                + "If you want least squares all the same, say why in 'outcomeReason'.",
                "outcomeReason");
        }
    }

    private static bool IsCountLike(SortedSet<double>? values) =>
        values is { Count: > 1 and <= CountDistinct, Min: 0 or 1 } && values.All(double.IsInteger);

    // Null where there are more than matter. Remainders play no part: what is whole or one of few values is exact in a double.
    private static SortedSet<double>? Distinct(NumberColumn column, IEnumerable<int> rows)
    {
        var values = new SortedSet<double>();
        foreach (var row in rows)
        {
            if (!column.IsMissing(row) && values.Add(column.Values[row]) && values.Count > CountDistinct)
            {
                return null;
            }
        }

        return values;
    }
}
