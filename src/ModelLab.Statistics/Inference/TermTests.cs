using ModelLab.Statistics.Designs;
using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>Tests every term of a fit given all others.</summary>
internal static class TermTests
{
    /// <summary>The terms in the order of the specification.</summary>
    public static IReadOnlyList<TermResult> Of(LeastSquaresFit fit, IReadOnlyCollection<Term> heldIn)
    {
        var specification = fit.Design.Specification;
        var results = new List<TermResult>();
        var first = specification.Intercept ? 1 : 0;
        foreach (var term in specification.Terms)
        {
            var count = fit.Design.Columns.Skip(first).TakeWhile(column => term.Equals(column.Term)).Count();
            var removable = Marginality.IsRemovable(term, specification, heldIn);
            results.Add(Of(fit, term, first, count, removable));
            first += count;
        }

        return results;
    }

    private static TermResult Of(LeastSquaresFit fit, Term term, int first, int count, bool removable)
    {
        var rise = PartialFTest.SumOfSquares(fit, first, count);
        var f = PartialFTest.F(rise, count, fit.ResidualSumOfSquares, fit.ResidualDegrees);
        var vif = count == 1 ? VarianceInflationFactor.Of(fit, first) : GeneralisedVarianceInflationFactor.Of(fit, first, count);
        return new TermResult(
            term,
            count,
            DoubleDouble.ScaleB(rise, 2 * fit.Design.OutcomeExponent).Hi,
            f?.Hi,
            f is { } value ? PartialFTest.P(value, count, fit.ResidualDegrees) : null,
            f is null ? null : (rise / (rise + fit.ResidualSumOfSquares)).Hi,
            vif?.Hi,
            removable);
    }
}
