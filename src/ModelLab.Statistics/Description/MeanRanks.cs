namespace ModelLab.Statistics.Description;

/// <summary>Ranks from 1, tied values at the mean of their ranks; values compare as the decimals that were written.</summary>
internal static class MeanRanks
{
    /// <summary>The rank of each value.</summary>
    public static double[] Of(double[] values, double[] remainders)
    {
        var order = new int[values.Length];
        for (var i = 0; i < order.Length; i++)
        {
            order[i] = i;
        }

        Array.Sort(order, (a, b) => values[a] != values[b] ? values[a].CompareTo(values[b]) : remainders[a].CompareTo(remainders[b]));
        var ranks = new double[values.Length];
        for (var from = 0; from < order.Length;)
        {
            var to = from + 1;
            while (to < order.Length && values[order[to]] == values[order[from]] && remainders[order[to]] == remainders[order[from]])
            {
                to++;
            }

            for (var i = from; i < to; i++)
            {
                // ranks from + 1 to `to`
                ranks[order[i]] = (from + 1.0 + to) / 2;
            }

            from = to;
        }

        return ranks;
    }
}
