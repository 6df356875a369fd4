using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>Gathers the figures of a whole model.</summary>
internal static class FitFigures
{
    /// <summary>The figures; Cp only where the full model's mean square is given.</summary>
    public static FitSummary Of(LeastSquaresFit fit, double? fullModelMeanSquare)
    {
        var rows = fit.Rows;
        var coefficients = fit.Columns;
        var exponent = fit.Design.OutcomeExponent;
        var residual = DoubleDouble.ScaleB(fit.ResidualSumOfSquares, 2 * exponent);
        var total = fit.TotalSumOfSquares;
        var isEmpty = AnalysisOfVariance.ModelDegrees(fit) == 0;
        var rSquared = isEmpty ? DoubleDouble.Zero : CoefficientOfDetermination.Of(fit.ResidualSumOfSquares, total);
        var totalDegrees = fit.ResidualDegrees + AnalysisOfVariance.ModelDegrees(fit);
        var press = Press(fit);
        double? likelihood = fit.IsExact ? null : InformationCriteria.LogLikelihood(residual, rows);
        return new FitSummary(
            N: rows,
            S: DoubleDouble.ScaleB(DoubleDouble.Sqrt(fit.MeanSquare), exponent).Hi,
            DfResidual: fit.ResidualDegrees,
            RSquared: rSquared.Hi,
            AdjustedRSquared: isEmpty ? 0.0 : CoefficientOfDetermination.Adjusted(fit.ResidualSumOfSquares, fit.ResidualDegrees, total, totalDegrees).Hi,
            PredictedRSquared: press is { } value ? CoefficientOfDetermination.Of(value, total).Hi : null,
            F: AnalysisOfVariance.F(fit)?.Hi,
            DfModel: AnalysisOfVariance.ModelDegrees(fit),
            P: AnalysisOfVariance.P(fit),
            SsModel: DoubleDouble.ScaleB(AnalysisOfVariance.Explained(fit), 2 * exponent).Hi,
            SsResidual: residual.Hi,
            SsTotal: DoubleDouble.ScaleB(total, 2 * exponent).Hi,
            Press: press is { } sum ? DoubleDouble.ScaleB(sum, 2 * exponent).Hi : null,
            LogLikelihood: likelihood,
            Aic: likelihood is { } ll ? InformationCriteria.Akaike(ll, coefficients) : null,
            Aicc: likelihood is { } llc ? InformationCriteria.AkaikeCorrected(llc, coefficients, rows) : null,
            Bic: likelihood is { } llb ? InformationCriteria.Schwarz(llb, coefficients, rows) : null,
            Cp: fullModelMeanSquare is { } square ? MallowsCp.Of(residual, square, rows, coefficients)?.Hi : null,
            R: DoubleDouble.Sqrt(rSquared).Hi,
            ExactFit: fit.IsExact);
    }

    // At an exact fit every row is predicted exactly by the others, unless its leverage is 1.
    private static DoubleDouble? Press(LeastSquaresFit fit)
    {
        var press = PredictedResidualSumOfSquares.Of(fit.Residuals, fit.Leverages);
        return press is not null && fit.IsExact ? DoubleDouble.Zero : press;
    }
}
