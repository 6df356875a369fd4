using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>Deviations from the mean in double-double, scaled by a power of two, with their sum of squares.</summary>
internal sealed class CentredValues
{
    private readonly double[] high;
    private readonly double[] low;

    private CentredValues(double[] high, double[] low, int count, bool hasSpread)
    {
        this.high = high;
        this.low = low;
        Count = count;
        HasSpread = hasSpread;
        SumOfSquares = DoubleDoubleLanes.Dot(high, low, high, low);
    }

    /// <summary>Number of values, n.</summary>
    public int Count { get; }

    /// <summary>Whether two values differ as written.</summary>
    public bool HasSpread { get; }

    /// <summary>Σd².</summary>
    public DoubleDouble SumOfSquares { get; }

    /// <summary>Σdₓd_y with another of the same rows.</summary>
    public DoubleDouble ProductSum(CentredValues other) => DoubleDoubleLanes.Dot(high, low, other.high, other.low);

    /// <summary>Centres values without missing ones.</summary>
    public static CentredValues Of(double[] values, double[] remainders)
    {
        var n = values.Length;
        var exponent = Moments.ExponentOf(values);
        var sum = DoubleDouble.Zero;
        var spread = false;
        for (var i = 0; i < n; i++)
        {
            sum += Scaled(values[i], remainders[i], exponent);
            spread |= values[i] != values[0] || remainders[i] != remainders[0];
        }

        var mean = n == 0 ? DoubleDouble.Zero : sum / n;
        var high = new double[DoubleDoubleLanes.Padded(n)];
        var low = new double[high.Length];
        var largest = 0.0;
        for (var i = 0; i < n; i++)
        {
            var deviation = Scaled(values[i], remainders[i], exponent) - mean;
            high[i] = deviation.Hi;
            low[i] = deviation.Lo;
            largest = Math.Max(largest, Math.Abs(deviation.Hi));
        }

        return new CentredValues(high, low, n, spread && largest > 0);
    }

    private static DoubleDouble Scaled(double value, double remainder, int exponent) =>
        DoubleDouble.ScaleB(DoubleDouble.FromSum(value, remainder), -exponent);
}
