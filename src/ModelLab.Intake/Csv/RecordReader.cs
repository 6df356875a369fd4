using System.Globalization;
using CsvHelper;
using ModelLab.Intake.Text;

namespace ModelLab.Intake.Csv;

/// <summary>
/// The rows of a text table, one at a time. Rows that do not fit the header or break the quoting are gathered as problems and
/// passed over; the table is refused at its end (or once there are a hundred of them). Blank lines before the header and at the
/// end of the file are left out; within a table of one column a blank line is a missing cell.
/// </summary>
internal sealed class RecordReader : IDisposable
{
    private readonly SourceText text;
    private readonly char delimiter;
    private readonly CsvReader records;
    private CsvMalformedRecord? malformed;
    private long heldBlanks;
    private bool holdsRecord;
    private bool blank;

    private RecordReader(SourceText text, char delimiter)
    {
        this.text = text;
        this.delimiter = delimiter;
        records = CsvReader.Create(
            text,
            new CsvReaderOptions
            {
                Separator = delimiter,
                HasHeader = false,
                SkipEmptyLines = false,
                DetectSeparatorHint = false,
                MalformedData = CsvMalformedDataHandling.Recover,
                OnMalformedRecord = record => malformed = record,
                MaxRecordSize = IntakeLimits.RowBytes,
                IncludeValuesInExceptions = false,
            },
            leaveOpen: true);
    }

    /// <summary>Names of the columns.</summary>
    internal IReadOnlyList<string> Names { get; private set; } = [];

    /// <summary>Number of the row at hand: 1 = first below the header.</summary>
    internal long Row { get; private set; }

    /// <summary>What was found wrong.</summary>
    internal ProblemList Problems { get; } = new();

    /// <summary>The cell of a column in the row at hand, its quotes taken off. Valid until the next row.</summary>
    internal ReadOnlySpan<byte> this[int column] => blank ? default : records.GetSpan(column);

    /// <summary>Reads the header.</summary>
    /// <exception cref="IntakeRefusedException">There is none, or too many columns.</exception>
    internal static RecordReader Open(SourceText text, char delimiter)
    {
        var reader = new RecordReader(text, delimiter);
        try
        {
            reader.ReadHeader();
            return reader;
        }
        catch
        {
            reader.Dispose();
            throw;
        }
    }

    /// <summary>Goes to the next row that fits the header; false at the end of a table without problems.</summary>
    /// <exception cref="IntakeRefusedException">The table has ended, or cannot be read on, and there are problems.</exception>
    internal bool Read()
    {
        while (true)
        {
            if (heldBlanks > 0 && holdsRecord)
            {
                heldBlanks--;
                Row++;
                if (Names.Count == 1)
                {
                    blank = true;
                    return true;
                }

                Problems.Add(Row, null, "The line is blank. Remove it, or write its delimiters where a row without values is meant.");
                continue;
            }

            blank = false;
            if (!holdsRecord && !TryAdvance())
            {
                Finish();
                return false;
            }

            if (heldBlanks > 0)
            {
                holdsRecord = true;
                continue;
            }

            holdsRecord = false;
            Row++;
            if (Fits())
            {
                return true;
            }
        }
    }

    /// <inheritdoc/>
    public void Dispose() => records.Dispose();

    private void ReadHeader()
    {
        Row = -1;
        if (!TryAdvance())
        {
            CheckFault();
            throw Problems.Refusal(null, null, "The file holds no text. Upload a table with a row of names and at least one row of values.");
        }

        if (SeparatorLine.Is(records.RawRecord) && !TryAdvance())
        {
            CheckFault();
            throw Problems.Refusal(null, null, "The file holds nothing but the name of its delimiter. Upload a table with a row of names and at least one row of values.");
        }

        heldBlanks = 0;
        Row = 0;
        CheckRecordIsWhole();
        if (records.FieldCount > IntakeLimits.Columns)
        {
            throw Problems.Refusal(0, null, string.Create(CultureInfo.InvariantCulture,
                $"The header has {records.FieldCount} columns; at most {IntakeLimits.Columns} are read. Keep the columns that the question needs."));
        }

        if (malformed is { } fault)
        {
            throw Problems.Refusal(0, ColumnNumber(QuoteFault.Column(records.RawRecord, delimiter)), QuoteFault.Message(fault.Reason));
        }

        var cells = new string[records.FieldCount];
        for (var i = 0; i < cells.Length; i++)
        {
            cells[i] = records.GetString(i);
        }

        Names = HeaderRow.Names(cells, Problems);
    }

    /// <summary>Goes to the next record that is not blank, counting the blank ones before it.</summary>
    private bool TryAdvance()
    {
        try
        {
            malformed = null;
            while (records.Read())
            {
                if (records.FieldCount > 1 || records.RawRecord.IndexOfAnyExcept((byte)' ', (byte)'\t') >= 0)
                {
                    return true;
                }

                heldBlanks++;
            }

            return false;
        }
        catch (CsvFormatException)
        {
            throw Problems.Refusal(Row + heldBlanks + 1, null, string.Create(CultureInfo.InvariantCulture,
                $"The row is longer than {IntakeLimits.RowBytes >> 20} MiB. Usually a quote is opened in it and never closed: close it, or double a quote that is meant as text (\"\")."));
        }
    }

    private bool Fits()
    {
        CheckRecordIsWhole();
        if (malformed is { } fault)
        {
            Problems.Add(Row, NameOf(QuoteFault.Column(records.RawRecord, delimiter)), QuoteFault.Message(fault.Reason));
            return false;
        }

        if (records.FieldCount != Names.Count)
        {
            Problems.Add(Row, null, string.Create(CultureInfo.InvariantCulture,
                $"The row has {Cells(records.FieldCount)} where the header has {Names.Count}. Add or remove delimiters; a cell that contains the delimiter {DelimiterName(delimiter)} must be enclosed in quotes."));
            return false;
        }

        return true;
    }

    private static string Cells(int count) => count == 1 ? "1 cell" : string.Create(CultureInfo.InvariantCulture, $"{count} cells");

    private static string DelimiterName(char delimiter) => delimiter == '\t' ? "(tab)" : $"'{delimiter}'";

    private void Finish()
    {
        CheckFault();
        Problems.ThrowIfAny();
        if (Row == 0)
        {
            throw Problems.Refusal(null, null, "There are names of columns but no rows below them. Upload the table with its rows.");
        }
    }

    /// <summary>Refuses a record in which the text ended because its bytes make no sense.</summary>
    private void CheckRecordIsWhole()
    {
        if (text.Fault is { } fault && records.ByteOffset + records.RawRecord.Length == text.Delivered)
        {
            throw Problems.Refusal(Row, NameOf(records.FieldCount - 1), fault.Message);
        }
    }

    /// <summary>Refuses a text that ended between two records because its bytes make no sense.</summary>
    private void CheckFault()
    {
        if (text.Fault is { } fault)
        {
            throw Problems.Refusal(Row + heldBlanks + 1, Names.Count == 0 ? null : NameOf(0), fault.Message);
        }
    }

    private string NameOf(int column) => column < Names.Count ? Names[column] : ColumnNumber(column);

    private static string ColumnNumber(int column) => (column + 1).ToString(CultureInfo.InvariantCulture);
}
