using ModelLab.Intake.Csv.Proposals;
using ModelLab.Intake.Csv.Reading;

namespace ModelLab.Intake.Csv.Profiling;

/// <summary>All that is noted of one column while the file streams by; its size does not grow with the rows.</summary>
/// <param name="name">Name of the column.</param>
/// <param name="distinctCap">Distinct values counted at most.</param>
internal sealed class ColumnTally(string name, int distinctCap)
{
    private readonly SortedSet<string> missingTexts = new(StringComparer.Ordinal);
    private readonly HashSet<ulong> missingHashes = [];

    /// <summary>Name of the column.</summary>
    internal string Name { get; } = name;

    /// <summary>Missing cells.</summary>
    internal long Missing { get; private set; }

    /// <summary>Texts taken as missing, in ordinal order.</summary>
    internal IReadOnlyCollection<string> MissingTexts => missingTexts;

    /// <summary>Numbers without a decimal mark.</summary>
    internal NumberTally Plain { get; } = new();

    /// <summary>Numbers with a point.</summary>
    internal NumberTally Point { get; } = new();

    /// <summary>Numbers with a comma.</summary>
    internal NumberTally Comma { get; } = new();

    /// <summary>Cells with unmistakable thousands marks.</summary>
    internal long Grouped { get; private set; }

    /// <summary>Row of the first such cell.</summary>
    internal long FirstGroupedRow { get; private set; }

    /// <summary>Cells that are neither missing nor any kind of number.</summary>
    internal long Texts { get; private set; }

    /// <summary>Row of the first such cell.</summary>
    internal long FirstTextRow { get; private set; }

    /// <summary>Whole numbers with zeros before them, such as 007.</summary>
    internal long LeadingZeros { get; private set; }

    /// <summary>Texts with spaces at their ends.</summary>
    internal long Spaced { get; private set; }

    /// <summary>Row of the first such text.</summary>
    internal long FirstSpacedRow { get; private set; }

    /// <summary>Distinct values that are numbers with a unit, currency or per cent sign.</summary>
    internal long DistinctWithUnit { get; private set; }

    /// <summary>Cells that are not missing.</summary>
    internal long Present => Plain.Count + Point.Count + Comma.Count + Grouped + Texts;

    /// <summary>Whether most values are numbers under one mark or the other.</summary>
    internal bool MostlyNumbers => Plain.Count + Point.Count + Comma.Count > Present / 2;

    /// <summary>Distinct values.</summary>
    internal DistinctTally Distinct { get; } = new(distinctCap);

    /// <summary>Dates.</summary>
    internal DateTally Dates { get; } = new();

    /// <summary>Whether the numbers count upwards.</summary>
    internal SequenceTally Sequence { get; } = new();

    /// <summary>Numbers that often stand for missing.</summary>
    internal SuspectNumbers Suspects { get; } = new();

    /// <summary>What in the texts points to people.</summary>
    internal IdentifierSigns Signs { get; } = new();

    /// <summary>Notes a cell.</summary>
    internal void Add(ReadOnlySpan<byte> cell, long row)
    {
        var text = CellText.Trim(cell);
        if (Csv.MissingTexts.IsMissingTrimmed(text))
        {
            AddMissing(text);
            return;
        }

        var shape = CellShape.OfTrimmed(text);
        switch (shape.Form)
        {
            case NumberForm.Plain:
                Plain.Add(shape.Value, shape.Whole, shape.GroupLike, row);
                break;
            case NumberForm.Point:
                Point.Add(shape.Value, shape.Whole, shape.GroupLike, row);
                break;
            case NumberForm.Comma:
                Comma.Add(shape.Value, shape.Whole, shape.GroupLike, row);
                break;
            case NumberForm.Grouped:
                FirstGroupedRow = Grouped++ == 0 ? row : FirstGroupedRow;
                break;
            default:
                AddText(cell.Length != text.Length, row);
                break;
        }

        if (shape.IsNumber)
        {
            LeadingZeros += shape.LeadingZero ? 1 : 0;
            Sequence.Add(shape.Value);
            Suspects.Add(shape.Value, shape.Whole);
        }

        // a number with a decimal mark is no date
        if (shape.Form is NumberForm.None or NumberForm.Plain or NumberForm.Grouped)
        {
            Dates.Add(text);
        }

        // a text keeps the spaces that RFC 4180 counts as its own, a number does not
        if (Distinct.Add(shape.IsNumber ? text : cell))
        {
            Signs.Add(text, shape.Form);
            DistinctWithUnit += shape.Form == NumberForm.None && UnitBesideNumber.Is(text) ? 1 : 0;
        }
    }

    private void AddMissing(ReadOnlySpan<byte> text)
    {
        Missing++;
        if (missingHashes.Add(TextHash.Of(text)))
        {
            missingTexts.Add(System.Text.Encoding.UTF8.GetString(text));
        }
    }

    private void AddText(bool spaced, long row)
    {
        FirstTextRow = Texts++ == 0 ? row : FirstTextRow;
        if (spaced)
        {
            FirstSpacedRow = Spaced++ == 0 ? row : FirstSpacedRow;
        }
    }
}
