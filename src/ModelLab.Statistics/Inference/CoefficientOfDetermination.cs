using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// R² and its relatives. R² = 1 − RSS/SST, SST about the mean; about zero without intercept, so that it compares with no model that
/// has one.
/// </summary>
/// <remarks>
/// Adjusted: 1 − (RSS/(n − p))/(SST/(n − 1)), n in place of n − 1 without intercept; source: Ezekiel (1930), Methods of Correlation
/// Analysis. Predicted: 1 − PRESS/SST; it may be negative.
/// </remarks>
public static class CoefficientOfDetermination
{
    /// <summary>R².</summary>
    public static DoubleDouble Of(DoubleDouble residual, DoubleDouble total) => DoubleDouble.One - (residual / total);

    /// <summary>Adjusted R².</summary>
    /// <param name="residual">RSS.</param>
    /// <param name="residualDegrees">n − p, one or more.</param>
    /// <param name="total">SST.</param>
    /// <param name="totalDegrees">n − 1; n without intercept.</param>
    public static DoubleDouble Adjusted(DoubleDouble residual, int residualDegrees, DoubleDouble total, int totalDegrees) =>
        DoubleDouble.One - (residual / residualDegrees / (total / totalDegrees));
}
