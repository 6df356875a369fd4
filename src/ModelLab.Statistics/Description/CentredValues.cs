using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>
/// Deviations from the mean in double-double, from the decimals as written. Values are first scaled by a power of two, which
/// is exact, so that powers of large or small numbers stay within range. Sums run in fixed lanes.
/// </summary>
internal sealed class CentredValues
{
    private readonly double[] high;
    private readonly double[] low;

    private CentredValues(double[] high, double[] low, int count, int exponent, DoubleDouble mean, bool hasSpread)
    {
        this.high = high;
        this.low = low;
        Count = count;
        Exponent = exponent;
        Mean = mean;
        HasSpread = hasSpread;
        SumOfSquares = DoubleDoubleLanes.Dot(high, low, high, low);
    }

    /// <summary>Number of values, n.</summary>
    public int Count { get; }

    /// <summary>The figures are of value·2^−Exponent.</summary>
    public int Exponent { get; }

    /// <summary>The mean; 0 for n = 0.</summary>
    public DoubleDouble Mean { get; }

    /// <summary>Whether two values differ as written.</summary>
    public bool HasSpread { get; }

    /// <summary>Σd².</summary>
    public DoubleDouble SumOfSquares { get; }

    /// <summary>Σdₓd_y with another of the same rows.</summary>
    public DoubleDouble ProductSum(CentredValues other) => DoubleDoubleLanes.Dot(high, low, other.high, other.low);

    /// <summary>Sums of the powers of the deviations.</summary>
    public Moments Moments()
    {
        var squareHigh = new double[high.Length];
        var squareLow = new double[high.Length];
        for (var i = 0; i < Count; i++)
        {
            var d = DoubleDouble.FromSum(high[i], low[i]);
            var square = d * d;
            squareHigh[i] = square.Hi;
            squareLow[i] = square.Lo;
        }

        return new Moments(
            Count, Exponent, Mean, SumOfSquares,
            DoubleDoubleLanes.Dot(squareHigh, squareLow, high, low),
            DoubleDoubleLanes.Dot(squareHigh, squareLow, squareHigh, squareLow),
            HasSpread);
    }

    /// <summary>Centres values without missing ones.</summary>
    /// <param name="values">The numbers rounded to double, finite.</param>
    /// <param name="remainders">What rounding took away; null where nothing.</param>
    public static CentredValues Of(double[] values, double[]? remainders)
    {
        var n = values.Length;
        var exponent = ExponentOf(values);
        // in two steps, for the power of two alone may lie outside the range of double
        var half = Math.ScaleB(1.0, -exponent / 2);
        var rest = Math.ScaleB(1.0, -exponent - (-exponent / 2));
        var high = new double[DoubleDoubleLanes.Padded(n)];
        var low = new double[high.Length];
        var hasSpread = false;
        for (var i = 0; i < n; i++)
        {
            var remainder = remainders is null ? 0 : remainders[i];
            high[i] = values[i] * half * rest;
            low[i] = remainder * half * rest;
            hasSpread |= values[i] != values[0] || (remainders is not null && remainder != remainders[0]);
        }

        var mean = n == 0 ? DoubleDouble.Zero : Sum(high, low) / n;
        for (var i = 0; i < n; i++)
        {
            var deviation = DoubleDouble.FromSum(high[i], low[i]) - mean;
            high[i] = deviation.Hi;
            low[i] = deviation.Lo;
        }

        return new CentredValues(high, low, n, exponent, mean, hasSpread);
    }

    // Four lanes, put together in one order; the length is a multiple of four.
    private static DoubleDouble Sum(double[] high, double[] low)
    {
        DoubleDouble a = 0.0, b = 0.0, c = 0.0, d = 0.0;
        for (var i = 0; i < high.Length; i += 4)
        {
            a += DoubleDouble.FromSum(high[i], low[i]);
            b += DoubleDouble.FromSum(high[i + 1], low[i + 1]);
            c += DoubleDouble.FromSum(high[i + 2], low[i + 2]);
            d += DoubleDouble.FromSum(high[i + 3], low[i + 3]);
        }

        return (a + b) + (c + d);
    }

    // The power of two that brings the largest of the values just below 1.
    private static int ExponentOf(double[] values)
    {
        var largest = 0.0;
        foreach (var value in values)
        {
            largest = Math.Max(largest, Math.Abs(value));
        }

        return largest == 0 ? 0 : Math.ILogB(largest) + 1;
    }
}
