using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// Cp = RSS/s² − n + 2p, s² the residual mean square of the full model on the same rows, p the coefficients of this model with its
/// intercept. For the full model Cp = p. Undefined where the full model fits exactly. Source: Mallows (1973), "Some comments on Cp",
/// Technometrics 15.
/// </summary>
public static class MallowsCp
{
    /// <summary>Cp, or null where <paramref name="fullModelMeanSquare"/> is not above zero.</summary>
    public static DoubleDouble? Of(DoubleDouble residualSumOfSquares, double fullModelMeanSquare, int rows, int coefficients) =>
        fullModelMeanSquare > 0.0
            ? (residualSumOfSquares / fullModelMeanSquare) - rows + (2.0 * coefficients)
            : null;
}
