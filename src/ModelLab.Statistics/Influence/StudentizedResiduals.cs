using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Influence;

/// <summary>
/// Residuals divided by their own standard error.
/// </summary>
/// <remarks>
/// Internally: r = e/(s√(1 − h)). Externally: the same with s from the fit without the row, whose residual sum of squares is
/// RSS − e²/(1 − h) on n − p − 1 degrees of freedom; under the model it follows Student's t on these. Undefined where the leverage is
/// 1, where s is 0 (exact fit), and externally also where no degree of freedom is left or the fit without the row is exact.
/// Source: Cook and Weisberg (1982), Residuals and Influence in Regression, chapter 2.
/// </remarks>
public static class StudentizedResiduals
{
    // A residual sum of squares without the row that is smaller than this share of the whole is rounding of double-double.
    private const double Rounding = 1e-24;

    /// <summary>Internally studentised residual.</summary>
    /// <param name="residual">e.</param>
    /// <param name="leverage">h.</param>
    /// <param name="residualSumOfSquares">RSS, in the square of the residual's unit.</param>
    /// <param name="degrees">n − p, one or more.</param>
    public static DoubleDouble? Internal(DoubleDouble residual, DoubleDouble leverage, DoubleDouble residualSumOfSquares, int degrees)
    {
        if (residualSumOfSquares.IsZero || Leverage.Complement(leverage) is not { } complement)
        {
            return null;
        }

        return residual / DoubleDouble.Sqrt(residualSumOfSquares / degrees * complement);
    }

    /// <summary>Externally studentised residual.</summary>
    /// <param name="residual">e.</param>
    /// <param name="leverage">h.</param>
    /// <param name="residualSumOfSquares">RSS, in the square of the residual's unit.</param>
    /// <param name="degrees">n − p.</param>
    public static DoubleDouble? External(DoubleDouble residual, DoubleDouble leverage, DoubleDouble residualSumOfSquares, int degrees)
    {
        if (degrees < 2 || residualSumOfSquares.IsZero || Leverage.Complement(leverage) is not { } complement)
        {
            return null;
        }

        var without = residualSumOfSquares - (residual * residual / complement);
        return without.Hi <= Rounding * residualSumOfSquares.Hi
            ? null
            : residual / DoubleDouble.Sqrt(without / (degrees - 1) * complement);
    }
}
