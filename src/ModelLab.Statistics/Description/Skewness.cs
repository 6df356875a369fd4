using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>
/// The adjusted skewness G₁ = √(n(n − 1))/(n − 2) · m₃/m₂^1.5, m the moments about the mean divided by n
/// (Joanes and Gill 1998).
/// </summary>
public static class Skewness
{
    /// <summary>G₁, without unit; null for fewer than 3 values or without spread.</summary>
    /// <exception cref="ArgumentException">A value is infinite.</exception>
    public static double? Of(NumberColumn column) => Of(Moments.Of(PresentValues.Of(column)));

    internal static double? Of(Moments moments)
    {
        double n = moments.Count;
        if (n < 3 || !moments.HasSpread)
        {
            return null;
        }

        // m₃/m₂^1.5 = √n Σd³/(Σd²)^1.5
        var ratio = moments.Third / (moments.Second * DoubleDouble.Sqrt(moments.Second));
        return (ratio * DoubleDouble.Sqrt((DoubleDouble)(n - 1)) * n / (n - 2)).Hi;
    }
}
