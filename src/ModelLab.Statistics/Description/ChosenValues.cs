using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Description;

/// <summary>The values of two variables on the rows in which neither is missing, centred.</summary>
internal sealed record CentredPair(CentredValues First, CentredValues Second);

/// <summary>
/// The values of one variable on chosen rows, missing ones among them. They are centred once for all partners that miss
/// no further row.
/// </summary>
internal sealed class ChosenValues
{
    private readonly double[] values;
    private readonly double[] remainders;
    private readonly bool ranked;
    private readonly int missing;
    private CentredValues? alone;

    private ChosenValues(double[] values, double[] remainders, bool ranked)
    {
        this.values = values;
        this.remainders = remainders;
        this.ranked = ranked;
        missing = values.Count(double.IsNaN);
    }

    /// <summary>Takes the values of the rows (all rows where empty).</summary>
    /// <exception cref="ArgumentException">A value is infinite.</exception>
    public static ChosenValues Of(NumberColumn column, ReadOnlySpan<int> rows, bool ranked)
    {
        var count = rows.IsEmpty ? column.Rows : rows.Length;
        var values = new double[count];
        var remainders = new double[count];
        for (var i = 0; i < count; i++)
        {
            var row = rows.IsEmpty ? i : rows[i];
            PresentValues.RequireFinite(column, row);
            values[i] = column.Values[row];
            remainders[i] = column.Remainders.IsEmpty ? 0 : column.Remainders[row];
        }

        return new ChosenValues(values, remainders, ranked);
    }

    /// <summary>This and another on the rows present in both.</summary>
    public CentredPair Together(ChosenValues other)
    {
        var present = new bool[values.Length];
        var missingHere = 0;
        for (var i = 0; i < present.Length; i++)
        {
            present[i] = !double.IsNaN(values[i]) && !double.IsNaN(other.values[i]);
            missingHere += present[i] ? 0 : 1;
        }

        return new CentredPair(On(present, missingHere), other.On(present, missingHere));
    }

    private CentredValues On(bool[] present, int missingHere)
    {
        if (missingHere == missing)
        {
            return alone ??= Centre(present, missingHere);
        }

        return Centre(present, missingHere);
    }

    private CentredValues Centre(bool[] present, int missingHere)
    {
        var v = new double[values.Length - missingHere];
        var r = new double[v.Length];
        var next = 0;
        for (var i = 0; i < present.Length; i++)
        {
            if (present[i])
            {
                v[next] = values[i];
                r[next++] = remainders[i];
            }
        }

        return ranked ? CentredValues.Of(MeanRanks.Of(v, r), null) : CentredValues.Of(v, r);
    }
}
