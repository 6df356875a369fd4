using ModelLab.Statistics.Distributions;
using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// Partial F test of a set of columns given all others.
/// </summary>
/// <remarks>
/// Taking q columns out raises the residual sum of squares by SS = b'V⁻¹b, b their coefficients and V their block of (X'X)⁻¹: the same as
/// the difference to the fit without them. F = (SS/q)/(RSS/(n − p)) on (q, n − p) degrees of freedom. Undefined at an exact fit.
/// Source: Seber and Lee (2003), Linear Regression Analysis, 2nd ed., section 4.3.
/// </remarks>
public static class PartialFTest
{
    /// <summary>F, or null at an exact fit (RSS = 0).</summary>
    public static DoubleDouble? F(DoubleDouble sumOfSquares, int columns, DoubleDouble residualSumOfSquares, int residualDegrees) =>
        residualSumOfSquares.IsZero ? null : sumOfSquares / columns / (residualSumOfSquares / residualDegrees);

    /// <summary>Upper tail of F.</summary>
    public static double P(DoubleDouble f, int columns, int residualDegrees) => FisherF.UpperTail(f.Hi, columns, residualDegrees);

    /// <summary>By how much RSS rises when columns <paramref name="first"/> to first + count − 1 are taken out.</summary>
    internal static DoubleDouble SumOfSquares(LeastSquaresFit fit, int first, int count)
    {
        // With V = LL', b'V⁻¹b is the squared length of L⁻¹b.
        var factor = SymmetricFactor.Of(count, (row, column) => fit.CrossProductInverse(first + row, first + column));
        var sum = DoubleDouble.Zero;
        var solved = new DoubleDouble[count];
        for (var row = 0; row < count; row++)
        {
            var value = fit.Coefficient(first + row);
            for (var column = 0; column < row; column++)
            {
                value -= factor[row, column] * solved[column];
            }

            solved[row] = value / factor[row, row];
            sum += solved[row] * solved[row];
        }

        return sum;
    }
}
