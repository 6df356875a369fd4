using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>
/// Mean and sums of powers about it, in double-double: a pass for the mean, a second for the deviations. Values are first
/// scaled by a power of two, which is exact, so that powers of large or small numbers stay within range.
/// Sums run in the order of the rows.
/// </summary>
/// <param name="Count">Number of values, n.</param>
/// <param name="Exponent">Figures below are of value·2^−Exponent.</param>
/// <param name="Mean">Σx/n; 0 for n = 0.</param>
/// <param name="Second">Σ(x − mean)².</param>
/// <param name="Third">Σ(x − mean)³.</param>
/// <param name="Fourth">Σ(x − mean)⁴.</param>
/// <param name="HasSpread">Whether two values differ as written.</param>
internal sealed record Moments(
    int Count, int Exponent, DoubleDouble Mean, DoubleDouble Second, DoubleDouble Third, DoubleDouble Fourth, bool HasSpread)
{
    /// <summary>Computes them.</summary>
    public static Moments Of(PresentValues values)
    {
        var exponent = ExponentOf(values.Values);
        var n = values.Count;
        var sum = DoubleDouble.Zero;
        var spread = false;
        for (var i = 0; i < n; i++)
        {
            sum += Scaled(values, i, exponent);
            spread |= values.Values[i] != values.Values[0] || values.Remainder(i) != values.Remainder(0);
        }

        var mean = n == 0 ? DoubleDouble.Zero : sum / n;
        DoubleDouble first = 0.0, second = 0.0, third = 0.0, fourth = 0.0;
        for (var i = 0; i < n; i++)
        {
            var d = Scaled(values, i, exponent) - mean;
            var square = d * d;
            first += d;
            second += square;
            third += square * d;
            fourth += square * square;
        }

        // What rounding left in the mean is taken out of the square sum (Chan, Golub and LeVeque 1983).
        return new Moments(n, exponent, mean, n == 0 ? second : second - (first * first / n), third, fourth, spread);
    }

    /// <summary>The power of two that brings the largest of the values just below 1.</summary>
    public static int ExponentOf(ReadOnlySpan<double> values)
    {
        var largest = 0.0;
        foreach (var value in values)
        {
            largest = Math.Max(largest, Math.Abs(value));
        }

        return largest == 0 ? 0 : Math.ILogB(largest) + 1;
    }

    /// <summary>A value times 2^−exponent.</summary>
    public static DoubleDouble Scaled(PresentValues values, int index, int exponent) =>
        DoubleDouble.ScaleB(DoubleDouble.FromSum(values.Values[index], values.Remainder(index)), -exponent);
}
