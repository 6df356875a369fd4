using System.Globalization;
using ModelLab.Statistics.Designs;
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
/// <param name="Weakest">The removable term that the rule would take first; null where none is removable or none can be judged.</param>
/// <param name="Remove">Whether the rule takes it.</param>
/// <param name="Explanation">One sentence with the number that decided.</param>
public sealed record EliminationChoice(TermLoss? Weakest, bool Remove, string Explanation);

/// <summary>A model that elimination passed through.</summary>
/// <param name="Specification">The model.</param>
/// <param name="Results">Its figures.</param>
/// <param name="Choice">What the rule said of it.</param>
public sealed record EliminationStep(ModelSpecification Specification, ModelResults Results, EliminationChoice Choice);

/// <summary>
/// Backward elimination, one term at a time, the model fitted anew after each.
/// </summary>
/// <remarks>
/// By p, the term with the largest p of its partial F leaves if that p lies above the threshold. By a criterion, the term without which
/// the criterion is best leaves if the criterion is then no worse than now. Among equal values the term with the later place in the
/// model leaves first. An exact fit cannot be judged, nor can AICc with too few rows. Source: Draper and Smith (1998), Applied
/// Regression Analysis, 3rd ed., section 15.2.
/// </remarks>
public static class BackwardElimination
{
    /// <summary>Version of the method, kept with every stored step.</summary>
    public const string MethodVersion = "backward-elimination/1";

    /// <summary>Judges the removable terms of a fit. Equal values are broken by the later place in the model.</summary>
    /// <exception cref="ArgumentException">By p without a threshold between 0 and 1, or a threshold with another criterion.</exception>
    public static EliminationChoice Choose(ModelResults results, ChoosingRule rule)
    {
        ArgumentNullException.ThrowIfNull(results);
        Check(rule);
        if (results.Losses.Count == 0)
        {
            return new EliminationChoice(null, false, "No term of the model may be removed.");
        }

        if (results.Fit.ExactFit)
        {
            return new EliminationChoice(null, false, "The model fits the outcome exactly, so no term can be judged: p and the criteria do not exist.");
        }

        TermLoss? weakest = null;
        foreach (var loss in results.Losses)
        {
            if (Strength(loss, rule.Criterion) is not { } strength)
            {
                return new EliminationChoice(null, false, TooFewRows(results));
            }

            if (weakest is null || strength <= Strength(weakest, rule.Criterion))
            {
                weakest = loss;
            }
        }

        var remove = rule.Criterion == Criterion.P
            ? weakest!.P > rule.RemoveAbove
            : Strength(weakest!, rule.Criterion) <= 0.0;
        return new EliminationChoice(weakest, remove, Explain(weakest!, rule, remove));
    }

    /// <summary>Eliminates from a model until the rule takes no further term.</summary>
    /// <param name="table">Where the variables are.</param>
    /// <param name="specification">The model to start from.</param>
    /// <param name="rows">Zero-based rows to analyse, ascending; the same in every step.</param>
    /// <param name="rule">The rule.</param>
    /// <param name="options">
    /// What each fit reports. Without a full model's mean square that of the first model is taken, so that every later step has its Cp.
    /// </param>
    /// <returns>Every model fitted, the first and the last counted.</returns>
    /// <exception cref="ModelRefusedException">The first model cannot be fitted.</exception>
    public static IReadOnlyList<EliminationStep> Run(
        DataTable table, ModelSpecification specification, ReadOnlySpan<int> rows, ChoosingRule rule, FitOptions options)
    {
        ArgumentNullException.ThrowIfNull(specification);
        ArgumentNullException.ThrowIfNull(options);
        var steps = new List<EliminationStep>();
        while (true)
        {
            var results = ModelFitter.Fit(Design.Create(table, specification, rows), options).Results;
            if (options.FullModelMeanSquare is null && !results.Fit.ExactFit)
            {
                options = options with { FullModelMeanSquare = results.Fit.SsResidual / results.Fit.DfResidual };
            }

            var choice = Choose(results, rule);
            steps.Add(new EliminationStep(specification, results, choice));
            if (!choice.Remove)
            {
                return steps;
            }

            specification = specification with { Terms = [.. specification.Terms.Where(term => !term.Equals(choice.Weakest!.Term))] };
        }
    }

    private static void Check(ChoosingRule rule)
    {
        ArgumentNullException.ThrowIfNull(rule);
        if (rule.Criterion == Criterion.P && rule.RemoveAbove is not (> 0.0 and < 1.0))
        {
            throw new ArgumentException("Choosing by p needs the p above which a term leaves, between 0 and 1.", nameof(rule));
        }

        if (rule.Criterion != Criterion.P && rule.RemoveAbove is not null)
        {
            throw new ArgumentException("Only choosing by p has a p above which a term leaves.", nameof(rule));
        }
    }

    // What speaks for keeping a term, the smaller the weaker; zero divides keeping from removing, except for p.
    private static double? Strength(TermLoss loss, Criterion criterion) => criterion switch
    {
        Criterion.P => -loss.P,
        Criterion.Aic => loss.AicChange,
        Criterion.Aicc => loss.AiccChange,
        Criterion.Bic => loss.BicChange,
        Criterion.AdjustedRSquared => -loss.AdjustedRSquaredChange,
        _ => throw new ArgumentOutOfRangeException(nameof(criterion), criterion, "Unknown criterion."),
    };

    private static string TooFewRows(ModelResults results) => string.Create(
        CultureInfo.InvariantCulture,
        $"With {results.Fit.N} rows and {results.Coefficients.Count} coefficients AICc does not exist, so no term can be judged by it.");

    private static string Explain(TermLoss weakest, ChoosingRule rule, bool remove)
    {
        var culture = CultureInfo.InvariantCulture;
        if (rule.Criterion == Criterion.P)
        {
            return string.Create(
                culture,
                $"{weakest.Term} has the largest p of the terms that may be removed, {weakest.P:G4}, {(remove ? "above" : "not above")} {rule.RemoveAbove:R}: {(remove ? "it is removed" : "nothing is removed")}.");
        }

        var (name, change, better) = rule.Criterion switch
        {
            Criterion.Aic => ("AIC", weakest.AicChange, "lowest"),
            Criterion.Aicc => ("AICc", weakest.AiccChange, "lowest"),
            Criterion.Bic => ("BIC", weakest.BicChange, "lowest"),
            _ => ("adjusted R²", weakest.AdjustedRSquaredChange, "highest"),
        };
        var sign = change > 0.0 ? "+" : "";
        return string.Create(
            culture,
            $"Without {weakest.Term} {name} is {better} of all removals, {sign}{change:G3} against now: {(remove ? "it is removed" : "nothing is removed")}.");
    }
}
