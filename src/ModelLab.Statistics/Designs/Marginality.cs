namespace ModelLab.Statistics.Designs;

/// <summary>Which terms need which others (marginality, Nelder 1977, "A reformulation of linear models").</summary>
public static class Marginality
{
    /// <summary>
    /// Whether <paramref name="lower"/> must stay as long as <paramref name="higher"/> is in the model: a variable while one of its
    /// powers is, a power while a higher one is.
    /// </summary>
    public static bool IsNeededBy(Term lower, Term higher) =>
        higher is PowerTerm power && lower switch
        {
            VariableTerm variable => string.Equals(variable.Variable, power.Variable, StringComparison.Ordinal),
            PowerTerm other => string.Equals(other.Variable, power.Variable, StringComparison.Ordinal) && other.Degree < power.Degree,
            _ => false,
        };

    /// <summary>
    /// Whether a term may be taken out of a model: it is not held in, no other term needs it, and something is left without it.
    /// </summary>
    public static bool IsRemovable(Term term, ModelSpecification specification, IReadOnlyCollection<Term> heldIn) =>
        !heldIn.Contains(term)
        && !specification.Terms.Any(other => IsNeededBy(term, other))
        && (specification.Intercept || specification.Terms.Count > 1);
}
