using ModelLab.Projects.Entries;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Paths;

/// <summary>Checks what a path is asked to be, before any model is fitted.</summary>
public static class PathPlans
{
    /// <summary>Checks candidates, terms held in, rule, level and covariance.</summary>
    /// <exception cref="RefusedException">Says what is wrong.</exception>
    public static void Check(PathPlan plan)
    {
        if (plan.Candidates.Count == 0)
        {
            throw RefusedException.Invalid("Name at least one candidate term.", "terms");
        }

        RequireDistinct(plan.Candidates, "terms");
        RequireDistinct(plan.HeldIn, "heldIn");

        if (plan.Candidates.FirstOrDefault(t => t.Variables.Contains(plan.Outcome, StringComparer.Ordinal)) is { } circular)
        {
            throw RefusedException.Invalid($"The outcome '{plan.Outcome}' cannot explain itself: leave out the term {circular}.", "terms");
        }

        foreach (var term in plan.Candidates)
        {
            RequireLowerParts(term, plan.Candidates);
        }

        if (plan.HeldIn.FirstOrDefault(t => !plan.Candidates.Contains(t)) is { } stray)
        {
            throw RefusedException.Invalid($"{stray} is held in but is no candidate term.", "heldIn");
        }

        if (plan.Covariance != "classical")
        {
            throw RefusedException.Invalid($"The covariance '{plan.Covariance}' is not offered; there is 'classical'.", "covariance");
        }

        if (!(plan.Confidence is >= 0.5 and <= 0.9999))
        {
            throw RefusedException.Invalid("The confidence level lies between 0.5 and 0.9999, e.g. 0.95.", "confidence");
        }

        CheckRule(plan.Rule);
    }

    /// <summary>A power needs its lower powers beside it (marginality, Nelder 1977).</summary>
    public static void RequireLowerParts(Term term, IReadOnlyList<Term> among)
    {
        if (term is PowerTerm power && LowerParts(power).FirstOrDefault(t => !among.Contains(t)) is { } lower)
        {
            throw RefusedException.Invalid($"{power} needs {lower} beside it: without its lower parts the curve would depend on where zero lies.", "terms");
        }
    }

    private static void RequireDistinct(IReadOnlyList<Term> terms, string field)
    {
        if (terms.Contains(null!))
        {
            throw RefusedException.Invalid("A term is empty: {\"variable\":\"x\"} names one.", field);
        }

        if (terms.GroupBy(t => t.Text, StringComparer.Ordinal).FirstOrDefault(g => g.Count() > 1) is { } twice)
        {
            throw RefusedException.Invalid($"The term {twice.Key} is named twice.", field);
        }
    }

    private static IEnumerable<Term> LowerParts(PowerTerm power)
    {
        yield return new VariableTerm(power.Variable);
        for (var degree = 2; degree < power.Degree; degree++)
        {
            yield return new PowerTerm(power.Variable, degree);
        }
    }

    private static void CheckRule(RuleRecord? rule)
    {
        if (rule is null)
        {
            return;
        }

        if (rule.Criterion == Criterion.P && !(rule.RemoveAbove is > 0 and < 1))
        {
            throw RefusedException.Invalid(
                "A rule by p needs 'removeAbove' between 0 and 1. No threshold is silent: 0.05 keeps little and favours what is strong by chance, 0.157 is about AIC for single columns.", "rule");
        }

        if (rule.Criterion != Criterion.P && rule.RemoveAbove is not null)
        {
            throw RefusedException.Invalid("'removeAbove' belongs to the criterion p alone.", "rule");
        }
    }
}
