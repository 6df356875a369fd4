using ModelLab.Projects.Entries;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Paths;

/// <summary>What a decision makes of the terms of a model.</summary>
public static class DecisionTerms
{
    /// <summary>The terms without one that may leave.</summary>
    /// <exception cref="RefusedException">It is not in the model, held in, needed by a power, or the last one.</exception>
    public static IReadOnlyList<Term> Without(PathStanding standing, Term term)
    {
        if (!standing.Terms.Contains(term))
        {
            throw RefusedException.Invalid($"{term} is not in the model. In it are: {string.Join(", ", standing.Terms)}.", "term");
        }

        if (standing.Path.Plan.HeldIn.Contains(term))
        {
            throw RefusedException.Invalid($"{term} is held in on this path. Start a side path without holding it in, if the team wants to see the model without it.", "term");
        }

        var needing = standing.Terms.Where(t => Marginality.IsNeededBy(term, t)).Select(t => t.Text).ToList();
        if (needing.Count > 0)
        {
            throw RefusedException.Invalid($"{term} stays while {string.Join(", ", needing)} is in the model (marginality). Remove the highest power first.", "term");
        }

        return standing.Terms.Count > 1 || standing.Path.Plan.Intercept
            ? [.. standing.Terms.Where(t => !t.Equals(term))]
            : throw RefusedException.Invalid($"{term} is the last term of a model without intercept; nothing would be left.", "term");
    }

    /// <summary>The terms with one more, in the place that it has among the candidates.</summary>
    /// <exception cref="RefusedException">It is in the model already, or made of variables that are no candidates.</exception>
    public static IReadOnlyList<Term> With(PathStanding standing, Term term)
    {
        if (standing.Terms.Contains(term))
        {
            throw RefusedException.Invalid($"{term} is in the model already.", "term");
        }

        var candidates = standing.Path.Plan.Candidates;
        if (term.Variables.FirstOrDefault(v => !candidates.Any(c => c.Variables.Contains(v, StringComparer.Ordinal))) is { } stranger)
        {
            throw RefusedException.Invalid(
                $"'{stranger}' is no candidate of this path; its missing values did not count when the rows were chosen. Start a path with it among the candidates.", "term");
        }

        PathPlans.RequireLowerParts(term, standing.Terms);
        return [.. standing.Terms.Append(term).OrderBy(t => Place(candidates, t))];
    }

    /// <summary>A removed term's figures in the revision before.</summary>
    public static RemovalEvidence? Evidence(RevisionFigures figures, Term term) =>
        figures.Losses.FirstOrDefault(l => l.Term == term.Text) is { } loss ? new RemovalEvidence(loss.Df, loss.F, loss.P, loss.RSquaredLoss, loss.AicChange) : null;

    private static int Place(IReadOnlyList<Term> candidates, Term term)
    {
        for (var i = 0; i < candidates.Count; i++)
        {
            if (candidates[i].Equals(term))
            {
                return i;
            }
        }

        return int.MaxValue;
    }
}
