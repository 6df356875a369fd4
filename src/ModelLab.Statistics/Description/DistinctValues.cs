namespace ModelLab.Statistics.Description;

/// <summary>The number of different values, compared as the decimals that were written.</summary>
internal static class DistinctValues
{
    /// <summary>How many different values an ascending sequence holds.</summary>
    public static int OfSorted(PresentValues sorted)
    {
        var distinct = sorted.Count == 0 ? 0 : 1;
        for (var i = 1; i < sorted.Count; i++)
        {
            if (sorted.Values[i] != sorted.Values[i - 1] || sorted.Remainder(i) != sorted.Remainder(i - 1))
            {
                distinct++;
            }
        }

        return distinct;
    }
}
