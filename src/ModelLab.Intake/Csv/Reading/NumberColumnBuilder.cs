using ModelLab.Statistics.Designs;

namespace ModelLab.Intake.Csv.Reading;

/// <summary>Makes a column of numbers as written; remainders are kept from the first value on that is not exact in a double.</summary>
internal sealed class NumberColumnBuilder : ColumnBuilder
{
    private readonly char decimalMark;
    private readonly MissingCodes missing;
    private readonly (double Value, double Remainder)[] missingNumbers;
    private readonly ChunkedValues<double> values = new();
    private ChunkedValues<double>? remainders;

    /// <summary>Begins a column.</summary>
    internal NumberColumnBuilder(ColumnRequest request, char decimalMark)
        : base(request)
    {
        this.decimalMark = decimalMark;
        missing = new MissingCodes(request.MissingCodes);
        missingNumbers = [.. missing.Numbers(decimalMark)];
    }

    /// <inheritdoc/>
    internal override string? Add(ReadOnlySpan<byte> cell)
    {
        if (missing.Contains(cell))
        {
            Append(double.NaN, 0);
            return null;
        }

        if (!NumberCell.TryRead(cell, decimalMark, out var value, out var remainder))
        {
            Append(double.NaN, 0);
            return $"The cell is no number (decimals are written with a {(decimalMark == '.' ? "point" : "comma")}, without thousands marks). Correct it in the file, or name its text as a missing code of this variable.";
        }

        if (Array.IndexOf(missingNumbers, (value, remainder)) >= 0)
        {
            Append(double.NaN, 0);
        }
        else
        {
            Append(value, remainder);
        }

        return null;
    }

    /// <inheritdoc/>
    internal override Column Build() => new NumberColumn(Request.Name, values.ToArray(), remainders?.ToArray());

    private void Append(double value, double remainder)
    {
        if (remainder != 0 && remainders is null)
        {
            remainders = new ChunkedValues<double>();
            for (var i = 0; i < values.Count; i++)
            {
                remainders.Add(0);
            }
        }

        values.Add(value);
        remainders?.Add(remainder);
    }
}
