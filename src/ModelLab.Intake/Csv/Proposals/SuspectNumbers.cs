using System.Globalization;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>
/// Counts whole numbers that are often written for a missing value (-9, -99, 999, ...; common practice) and says afterwards which of
/// them stand apart from the other values: negative where no other number is, or below or above all others by a clear step. The -1 of a
/// design in -1, 0, 1 is none. They are questioned, never taken.
/// </summary>
internal sealed class SuspectNumbers
{
    // a step clear of the other values: a tenth of their range and no less than two
    private const double ClearShareOfRange = 0.1;
    private const double ClearStep = 2;

    // one nine among small numbers is more often a nine
    private const int FewestNines = 2;

    private static readonly double[] Usual =
        [-9999, -999, -998, -997, -99, -98, -97, -88, -77, -9, -8, -7, -1, 9, 99, 88, 77, 98, 97, 999, 998, 997, 888, 777, 9999, 8888, 99999, 999999];

    private const int TableReach = 9999;
    private static readonly sbyte[] Places = [.. Enumerable.Range(-TableReach, (2 * TableReach) + 1).Select(v => (sbyte)Array.IndexOf(Usual, v))];

    private readonly long[] counts = new long[Usual.Length];
    private double minimum = double.PositiveInfinity;
    private double maximum = double.NegativeInfinity;

    /// <summary>Sees a number.</summary>
    internal void Add(double value, bool whole)
    {
        if (whole && value is >= -TableReach and <= 999999)
        {
            var index = value <= TableReach ? Places[(int)value + TableReach] : Array.IndexOf(Usual, value);
            if (index >= 0)
            {
                counts[index]++;
                return;
            }
        }

        minimum = value < minimum ? value : minimum;
        maximum = value > maximum ? value : maximum;
    }

    /// <summary>The numbers that stand apart, smallest first, as texts.</summary>
    internal IReadOnlyList<string> Apart()
    {
        if (minimum > maximum)
        {
            return [];
        }

        var step = Math.Max(ClearStep, ClearShareOfRange * (maximum - minimum));
        return [.. Usual.Where((value, i) => counts[i] >= (value == 9 ? FewestNines : 1) && IsApart(value, step)).Order().Select(v => v.ToString(CultureInfo.InvariantCulture))];
    }

    private bool IsApart(double value, double step) =>
        value < 0
            ? (minimum >= 0 && (value != -1 || maximum > 1)) || value <= minimum - step
            : value >= maximum + step;
}
