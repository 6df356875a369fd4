namespace ModelLab.Intake.Csv.Profiling;

/// <summary>What numbers of one form (without mark, with point, with comma) a column holds.</summary>
internal sealed class NumberTally
{
    /// <summary>How many.</summary>
    internal long Count { get; private set; }

    /// <summary>How many of them could as well be written with a thousands mark.</summary>
    internal long GroupLike { get; private set; }

    /// <summary>Row of the first, 0 where there is none.</summary>
    internal long FirstRow { get; private set; }

    /// <summary>Row of the first that could be written with a thousands mark, 0 where there is none.</summary>
    internal long FirstGroupLikeRow { get; private set; }

    /// <summary>Whether all are whole.</summary>
    internal bool Whole { get; private set; } = true;

    /// <summary>Smallest; positive infinity where there is none.</summary>
    internal double Minimum { get; private set; } = double.PositiveInfinity;

    /// <summary>Largest; negative infinity where there is none.</summary>
    internal double Maximum { get; private set; } = double.NegativeInfinity;

    /// <summary>Adds a number.</summary>
    internal void Add(double value, bool whole, bool groupLike, long row)
    {
        if (Count++ == 0)
        {
            FirstRow = row;
        }

        if (groupLike && GroupLike++ == 0)
        {
            FirstGroupLikeRow = row;
        }

        Whole &= whole;
        Minimum = value < Minimum ? value : Minimum;
        Maximum = value > Maximum ? value : Maximum;
    }
}
