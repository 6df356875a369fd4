using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>
/// Sample quantiles by definition 7 of Hyndman and Fan (1996): at h = (n − 1)p above the smallest value, linear between
/// neighbours.
/// </summary>
public static class Quantiles
{
    /// <summary>The quantile at <paramref name="p"/>, in the column's unit; null where no value is present.</summary>
    /// <param name="column">The values; missing ones are left out.</param>
    /// <param name="p">Share of the values below, 0 to 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">p lies outside 0 to 1.</exception>
    /// <exception cref="ArgumentException">A value is infinite.</exception>
    public static double? Of(NumberColumn column, double p)
    {
        if (!(p >= 0 && p <= 1))
        {
            throw new ArgumentOutOfRangeException(nameof(p), p, "The share of values below a quantile lies between 0 and 1.");
        }

        return OfSorted(PresentValues.Of(column).Sorted(), p);
    }

    internal static double? OfSorted(PresentValues sorted, double p)
    {
        if (sorted.Count == 0)
        {
            return null;
        }

        var place = DoubleDouble.FromProduct(sorted.Count - 1, p);
        var index = Math.Min((int)Math.Floor(place.Hi), sorted.Count - 1);
        var share = place - index;
        if (share.Hi <= 0 || index == sorted.Count - 1)
        {
            return sorted.Values[index];
        }

        // weighted rather than by the difference, which could overflow
        var below = At(sorted, index) * (1.0 - share);
        return (below + (At(sorted, index + 1) * share)).Hi;
    }

    private static DoubleDouble At(PresentValues sorted, int index) =>
        DoubleDouble.FromSum(sorted.Values[index], sorted.Remainder(index));
}
