namespace ModelLab.Intake.Csv.Profiling;

/// <summary>Watches whether the numbers of a column count upwards by one from row to row.</summary>
internal sealed class SequenceTally
{
    private double expected;
    private bool broken;

    /// <summary>First number.</summary>
    internal double First { get; private set; }

    /// <summary>Numbers seen.</summary>
    internal long Count { get; private set; }

    /// <summary>Whether all numbers so far followed one another.</summary>
    internal bool Runs => !broken && Count > 1;

    /// <summary>Sees the next number.</summary>
    internal void Add(double value)
    {
        if (Count++ == 0)
        {
            First = value;
        }
        else if (value != expected)
        {
            broken = true;
        }

        expected = value + 1;
    }
}
