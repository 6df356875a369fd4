using ModelLab.Statistics.Designs;
using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>The test of a term with the rise of RSS at full accuracy, in the scaled units of the fit.</summary>
internal sealed record TermTest(TermResult Result, DoubleDouble Rise);

/// <summary>Tests every term of a fit given all others.</summary>
internal static class TermTests
{
    /// <summary>The terms in the order of the specification.</summary>
    /// <param name="fit">The fit.</param>
    /// <param name="coefficients">Its coefficients: the p of a term with one column is that of its t, for F = t².</param>
    /// <param name="heldIn">Terms that may not be removed.</param>
    public static IReadOnlyList<TermTest> Of(LeastSquaresFit fit, IReadOnlyList<CoefficientResult> coefficients, IReadOnlyCollection<Term> heldIn)
    {
        var specification = fit.Design.Specification;
        var results = new List<TermTest>();
        var first = specification.Intercept ? 1 : 0;
        foreach (var term in specification.Terms)
        {
            var count = 1;
            while (first + count < fit.Columns && ReferenceEquals(fit.Design.Columns[first + count].Term, term))
            {
                count++;
            }

            var removable = Marginality.IsRemovable(term, specification, heldIn);
            results.Add(Of(fit, term, first, count, coefficients[first].P, removable));
            first += count;
        }

        return results;
    }

    private static TermTest Of(LeastSquaresFit fit, Term term, int first, int count, double? p, bool removable)
    {
        var rise = PartialFTest.SumOfSquares(fit, first, count);
        var f = PartialFTest.F(rise, count, fit.ResidualSumOfSquares, fit.ResidualDegrees);
        var vif = count == 1 ? VarianceInflationFactor.Of(fit, first) : GeneralisedVarianceInflationFactor.Of(fit, first, count);
        var result = new TermResult(
            term,
            count,
            DoubleDouble.ScaleB(rise, 2 * fit.Design.OutcomeExponent).Hi,
            f?.Hi,
            f is { } value && count > 1 ? PartialFTest.P(value, count, fit.ResidualDegrees) : p,
            f is null ? null : (rise / (rise + fit.ResidualSumOfSquares)).Hi,
            vif?.Hi,
            removable);
        return new TermTest(result, rise);
    }
}
