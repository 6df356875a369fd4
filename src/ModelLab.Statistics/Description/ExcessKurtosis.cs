using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Description;

/// <summary>
/// The adjusted excess kurtosis G₂ = (n − 1)/((n − 2)(n − 3)) · ((n + 1)(m₄/m₂² − 3) + 6), m the moments about the mean
/// divided by n (Joanes and Gill 1998); 0 is expected of normal values.
/// </summary>
public static class ExcessKurtosis
{
    /// <summary>G₂, without unit; null for fewer than 4 values or without spread.</summary>
    /// <exception cref="ArgumentException">A value is infinite.</exception>
    public static double? Of(NumberColumn column) => Of(Moments.Of(PresentValues.Of(column)));

    internal static double? Of(Moments moments)
    {
        double n = moments.Count;
        if (n < 4 || !moments.HasSpread)
        {
            return null;
        }

        var excess = (moments.Fourth * n / (moments.Second * moments.Second)) - 3.0;
        return (((excess * (n + 1)) + 6.0) * (n - 1) / (n - 2) / (n - 3)).Hi;
    }
}
