using ModelLab.Statistics.Inference;

namespace ModelLab.Statistics.Selection;

/// <summary>By what a term is judged.</summary>
public enum Criterion
{
    /// <summary>Partial-F p above a threshold.</summary>
    P,

    /// <summary>Akaike's criterion falls (or stays) without the term.</summary>
    Aic,

    /// <summary>The small-sample form.</summary>
    Aicc,

    /// <summary>Schwarz's criterion.</summary>
    Bic,

    /// <summary>Adjusted R² rises (or stays) without the term.</summary>
    AdjustedRSquared,
}

/// <summary>A rule of backward elimination.</summary>
/// <param name="Criterion">By what a term is judged.</param>
/// <param name="RemoveAbove">For p: the term with the largest p above this leaves. Null otherwise.</param>
public sealed record ChoosingRule(Criterion Criterion, double? RemoveAbove);

/// <summary>What a rule says of a fitted model.</summary>
/// <param name="Weakest">The removable term that the rule would take first; null where none is removable.</param>
/// <param name="Remove">Whether the rule takes it.</param>
/// <param name="Explanation">One sentence with the number that decided.</param>
public sealed record EliminationChoice(TermLoss? Weakest, bool Remove, string Explanation);

/// <summary>Backward elimination, one term at a time.</summary>
public static class BackwardElimination
{
    /// <summary>Version of the method, kept with every stored step.</summary>
    public const string MethodVersion = "backward-elimination/1";

    /// <summary>Judges the removable terms of a fit. Equal values are broken by the later place in the model.</summary>
    public static EliminationChoice Choose(ModelResults results, ChoosingRule rule) => throw new NotImplementedException();
}
