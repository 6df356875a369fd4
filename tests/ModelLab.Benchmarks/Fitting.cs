using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Selection;

namespace ModelLab.Benchmarks;

/// <summary>Fits and eliminations by the engine alone. A fit gives everything that a revision records, at full accuracy.</summary>
public static class Fitting
{
    private static readonly FitOptions Options = new(0.95, []);

    /// <summary>The threshold of the elimination.</summary>
    public static readonly ChoosingRule Rule = new(Criterion.P, 0.05);

    /// <summary>One fit of all predictors.</summary>
    public static ModelResults Fit(RegressionData data, IReadOnlyList<Term> terms) =>
        ModelFitter.Fit(Design.Create(data.Table, new ModelSpecification("y", terms), data.Rows), Options).Results;

    /// <summary>Backward elimination from all predictors, with a refit a step; gives the terms that stay.</summary>
    public static IReadOnlyList<Term> Eliminate(RegressionData data)
    {
        var terms = data.Terms;
        while (true)
        {
            var choice = BackwardElimination.Choose(Fit(data, terms), Rule);
            if (!choice.Remove)
            {
                return terms;
            }

            terms = [.. terms.Where(t => !t.Equals(choice.Weakest!.Term))];
        }
    }
}
