using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Distributions;
using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// The coefficients with what is inferred of each: standard error s√(X'X)⁻¹ⱼⱼ, t = b/SE on n − p degrees of freedom, its two-sided p and
/// the interval b ± t·SE. All of it undefined at an exact fit. Source: Seber and Lee (2003), Linear Regression Analysis, chapters 3–5.
/// </summary>
internal static class CoefficientFigures
{
    /// <summary>The coefficients in the order of the design's columns.</summary>
    public static IReadOnlyList<CoefficientResult> Of(LeastSquaresFit fit, double confidence)
    {
        var quantile = fit.IsExact ? double.NaN : StudentT.UpperQuantile(ConfidenceLevel.UpperTail(confidence), fit.ResidualDegrees);
        var standardised = StandardisedCoefficient.Of(fit);
        var results = new CoefficientResult[fit.Columns];
        for (var column = 0; column < results.Length; column++)
        {
            results[column] = Of(fit, column, quantile, standardised[column]);
        }

        return results;
    }

    private static CoefficientResult Of(LeastSquaresFit fit, int column, double quantile, DoubleDouble? standardised)
    {
        var design = fit.Design;
        var named = design.Columns[column];
        var exponent = design.OutcomeExponent - design.Exponent(column);
        var estimate = DoubleDouble.ScaleB(fit.Coefficient(column), exponent);
        var isSlope = named.Term is not null;
        var result = new CoefficientResult(
            named.Term, named.CategoryIndex, named.Category, estimate.Hi, null, null, null, null, null,
            standardised?.Hi, null, null, isSlope ? VarianceInflationFactor.Of(fit, column)?.Hi : null);
        if (fit.IsExact)
        {
            return result;
        }

        var error = DoubleDouble.ScaleB(DoubleDouble.Sqrt(fit.CrossProductInverse(column, column) * fit.MeanSquare), exponent);
        var t = estimate / error;
        var isSingle = isSlope && !SharesTerm(design, column, column - 1) && !SharesTerm(design, column, column + 1);
        var unexplained = fit.ResidualSumOfSquares / fit.TotalSumOfSquares;
        return result with
        {
            StandardError = error.Hi,
            T = t.Hi,
            P = StudentT.TwoSided(t.Hi, fit.ResidualDegrees),
            Lower = (estimate - (error * quantile)).Hi,
            Upper = (estimate + (error * quantile)).Hi,
            PartialR = isSingle ? PartialCorrelation.Partial(t, fit.ResidualDegrees).Hi : null,
            SemiPartialR = isSingle ? PartialCorrelation.SemiPartial(t, unexplained, fit.ResidualDegrees).Hi : null,
        };
    }

    // The columns of a term stand side by side.
    private static bool SharesTerm(Design design, int column, int other) =>
        other >= 0 && other < design.Columns.Count && ReferenceEquals(design.Columns[column].Term, design.Columns[other].Term);
}
