using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Description;

/// <summary>The arithmetic mean Σx/n of the values present, from the decimals as written.</summary>
public static class Mean
{
    /// <summary>The mean in the column's unit; null where no value is present.</summary>
    /// <exception cref="ArgumentException">A value is infinite.</exception>
    public static double? Of(NumberColumn column) => Of(Moments.Of(PresentValues.Of(column)));

    internal static double? Of(Moments moments) =>
        moments.Count == 0 ? null : Math.ScaleB(moments.Mean.Hi, moments.Exponent);
}
