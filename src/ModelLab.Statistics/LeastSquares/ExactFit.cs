using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.LeastSquares;

/// <summary>
/// Whether a fit leaves nothing but rounding.
/// </summary>
/// <remarks>
/// Forming y − Xb in double-double errs in each row by up to about u(|y| + Σ|xⱼbⱼ|) with u = 2⁻¹⁰⁴, and the reflections add errors of
/// the same size for each column. So a residual length √RSS ≤ 16 (p + 1) u (‖y‖ + Σ‖xⱼ‖|bⱼ|) cannot be told from zero. The bound lies
/// at about 10⁻³⁰ of the outcome's length: numbers that fit to all the digits of a double only are not an exact fit.
/// </remarks>
internal static class ExactFit
{
    private static readonly double Unit = Math.ScaleB(1.0, -104);

    /// <summary>Whether a residual sum of squares lies below the bound.</summary>
    public static bool Holds(LeastSquaresFit fit, DoubleDouble residualSumOfSquares)
    {
        var last = fit.Columns;
        var size = Math.Sqrt(SumOfSquares(fit, last).Hi);
        for (var column = 0; column < last; column++)
        {
            size += Math.Sqrt(SumOfSquares(fit, column).Hi) * Math.Abs(fit.Coefficient(column).Hi);
        }

        return Math.Sqrt(residualSumOfSquares.Hi) <= 16.0 * (last + 1) * Unit * size;
    }

    private static DoubleDouble SumOfSquares(LeastSquaresFit fit, int column)
    {
        var sum = DoubleDouble.Zero;
        for (var row = 0; row <= column; row++)
        {
            sum += fit.Triangular(row, column) * fit.Triangular(row, column);
        }

        return sum;
    }
}
