using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// The analysis-of-variance table: SST = explained + RSS with their degrees of freedom, and the overall F = (explained/df)/(RSS/(n − p)).
/// About zero without intercept. F is undefined without predictors and at an exact fit.
/// </summary>
internal static class AnalysisOfVariance
{
    /// <summary>Overall F, or null where undefined.</summary>
    public static DoubleDouble? F(LeastSquaresFit fit) => ModelDegrees(fit) == 0
        ? null
        : PartialFTest.F(Explained(fit), ModelDegrees(fit), fit.ResidualSumOfSquares, fit.ResidualDegrees);

    /// <summary>Its p, or null where undefined.</summary>
    public static double? P(LeastSquaresFit fit) => F(fit) is { } f ? PartialFTest.P(f, ModelDegrees(fit), fit.ResidualDegrees) : null;

    /// <summary>SST − RSS; zero without predictors.</summary>
    public static DoubleDouble Explained(LeastSquaresFit fit) =>
        ModelDegrees(fit) == 0 ? DoubleDouble.Zero : fit.TotalSumOfSquares - fit.ResidualSumOfSquares;

    /// <summary>Columns without the intercept.</summary>
    public static int ModelDegrees(LeastSquaresFit fit) => fit.Columns - (fit.Design.Specification.Intercept ? 1 : 0);

    /// <summary>The three lines.</summary>
    public static IReadOnlyList<VarianceLine> Of(LeastSquaresFit fit)
    {
        var degrees = ModelDegrees(fit);
        var explained = Explained(fit);
        return
        [
            new VarianceLine(VarianceSource.Model, degrees, InUnits(fit, explained), degrees == 0 ? null : InUnits(fit, explained / degrees), F(fit)?.Hi, P(fit)),
            new VarianceLine(VarianceSource.Residual, fit.ResidualDegrees, InUnits(fit, fit.ResidualSumOfSquares), InUnits(fit, fit.MeanSquare), null, null),
            new VarianceLine(VarianceSource.Total, degrees + fit.ResidualDegrees, InUnits(fit, fit.TotalSumOfSquares), null, null, null),
        ];
    }

    private static double InUnits(LeastSquaresFit fit, DoubleDouble square) => DoubleDouble.ScaleB(square, 2 * fit.Design.OutcomeExponent).Hi;
}
