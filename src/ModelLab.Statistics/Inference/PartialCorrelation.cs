using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// Correlations of the outcome with one column given all others, from its t.
/// </summary>
/// <remarks>
/// Partial: the others are taken out of both, t/√(t² + n − p). Semi-partial: out of the column only, t√((1 − R²)/(n − p)); its square is
/// the R² that the column adds last. Both have the sign of t. Source: Cohen, Cohen, West and Aiken (2003), Applied Multiple
/// Regression/Correlation Analysis, 3rd ed., section 3.3.
/// </remarks>
public static class PartialCorrelation
{
    /// <summary>Partial correlation.</summary>
    public static DoubleDouble Partial(DoubleDouble t, int residualDegrees) =>
        t / DoubleDouble.Sqrt((t * t) + residualDegrees);

    /// <summary>Semi-partial correlation.</summary>
    /// <param name="t">t of the coefficient.</param>
    /// <param name="unexplained">1 − R².</param>
    /// <param name="residualDegrees">n − p.</param>
    public static DoubleDouble SemiPartial(DoubleDouble t, DoubleDouble unexplained, int residualDegrees) =>
        t * DoubleDouble.Sqrt(unexplained / residualDegrees);
}
