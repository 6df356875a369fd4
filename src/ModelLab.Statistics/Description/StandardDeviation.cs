using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>The sample standard deviation √(Σ(x − mean)²/(n − 1)) of the values present, from the decimals as written.</summary>
public static class StandardDeviation
{
    /// <summary>The standard deviation in the column's unit; null for fewer than 2 values.</summary>
    /// <exception cref="ArgumentException">A value is infinite.</exception>
    public static double? Of(NumberColumn column) => Of(Moments.Of(PresentValues.Of(column)));

    internal static double? Of(Moments moments)
    {
        if (moments.Count < 2)
        {
            return null;
        }

        return moments.HasSpread
            ? Math.ScaleB(DoubleDouble.Sqrt(moments.Second / (moments.Count - 1.0)).Hi, moments.Exponent)
            : 0;
    }
}
