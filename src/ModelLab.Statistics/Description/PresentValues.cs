using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Description;

/// <summary>
/// The values of a column that are not missing, in the order of its rows, as written: value and remainder.
/// </summary>
internal sealed class PresentValues
{
    private PresentValues(double[] values, double[]? remainders)
    {
        Values = values;
        Remainders = remainders;
    }

    /// <summary>The numbers rounded to double.</summary>
    public double[] Values { get; }

    /// <summary>What rounding took away; null where nothing.</summary>
    public double[]? Remainders { get; }

    /// <summary>How many.</summary>
    public int Count => Values.Length;

    /// <summary>Takes the values present in all rows of a column.</summary>
    /// <exception cref="ArgumentException">A value is infinite; the message names the row.</exception>
    public static PresentValues Of(NumberColumn column)
    {
        var all = column.Values;
        var rests = column.Remainders;
        var count = 0;
        for (var row = 0; row < all.Length; row++)
        {
            RequireFinite(column, row);
            count += double.IsNaN(all[row]) ? 0 : 1;
        }

        var values = new double[count];
        var remainders = rests.IsEmpty ? null : new double[count];
        var next = 0;
        for (var row = 0; row < all.Length; row++)
        {
            if (double.IsNaN(all[row]))
            {
                continue;
            }

            values[next] = all[row];
            if (remainders is not null)
            {
                remainders[next] = rests[row];
            }

            next++;
        }

        return new PresentValues(values, remainders);
    }

    /// <summary>The same values in ascending order, by the decimals as written.</summary>
    public PresentValues Sorted()
    {
        var values = (double[])Values.Clone();
        if (Remainders is null)
        {
            Array.Sort(values);
            return new PresentValues(values, null);
        }

        var remainders = (double[])Remainders.Clone();
        Array.Sort(values, remainders);
        for (var from = 0; from < values.Length;)
        {
            var to = from + 1;
            while (to < values.Length && values[to] == values[from])
            {
                to++;
            }

            Array.Sort(remainders, from, to - from);
            from = to;
        }

        return new PresentValues(values, remainders);
    }

    /// <summary>The remainder at a place; 0 where there are none.</summary>
    public double Remainder(int index) => Remainders is null ? 0 : Remainders[index];

    /// <summary>Refuses an infinite value.</summary>
    /// <exception cref="ArgumentException">The value of the row is infinite.</exception>
    public static void RequireFinite(NumberColumn column, int row)
    {
        if (double.IsInfinity(column.Values[row]))
        {
            throw new ArgumentException($"Column '{column.Name}' holds an infinite value in row {row + 1}; it cannot be described.", nameof(column));
        }
    }
}
