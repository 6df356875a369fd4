using ModelLab.Intake.Csv.Profiling;
using ModelLab.Intake.Csv.Reading;
using ModelLab.Statistics.Designs;

namespace ModelLab.Intake.Csv;

/// <summary>What a person knows about a file and the program need not guess.</summary>
/// <param name="Delimiter">Null: found from the text.</param>
/// <param name="DecimalMark">Null: found from the text.</param>
/// <param name="Encoding">Null: found from the bytes.</param>
public sealed record CsvOptions(char? Delimiter = null, char? DecimalMark = null, string? Encoding = null);

/// <summary>A column to read: as a number or as categories.</summary>
/// <param name="Name">Header text.</param>
/// <param name="Numeric">Numbers, else categories.</param>
/// <param name="MissingCodes">Texts that mean missing, besides the empty cell, spaces around them left out. For numbers a code that is itself a number is compared by value.</param>
/// <param name="Categories">For categories: their texts in order; null: all texts met, in ordinal order. A text outside is refused with its row.</param>
/// <param name="Reference">For categories: the reference category's text; null: the first.</param>
public sealed record ColumnRequest(string Name, bool Numeric, IReadOnlyList<string> MissingCodes, IReadOnlyList<string>? Categories = null, string? Reference = null);

/// <summary>
/// Reads text tables as of RFC 4180 by streaming: cells in quotes with delimiters, doubled quotes and line breaks inside; CRLF, LF or CR
/// between rows. Blank lines before the header and at the end are left out. Row 1 is the first below the header.
/// </summary>
public static class CsvTable
{
    /// <summary>Version of the reading, kept with every dataset.</summary>
    public const string MethodVersion = "csv-reading/1";

    /// <summary>The delimiters that are read.</summary>
    public static IReadOnlyList<char> Delimiters { get; } = DelimiterDetection.Candidates;

    /// <summary>The decimal marks that are read.</summary>
    public static IReadOnlyList<char> DecimalMarks { get; } = ['.', ','];

    /// <summary>Reads a whole file once and says what is in it, without keeping it.</summary>
    /// <param name="stream">The file, read forward only; not disposed. It need not be seekable.</param>
    /// <param name="options">What is known of it.</param>
    /// <param name="cancellation">Stops the reading.</param>
    /// <exception cref="IntakeRefusedException">No text table; ragged rows; duplicate or empty headers; undecodable text. Rows and columns are named.</exception>
    /// <exception cref="ArgumentException">The options name a delimiter or decimal mark that is not known.</exception>
    public static TableProfile Profile(Stream stream, CsvOptions options, CancellationToken cancellation = default)
    {
        ArgumentNullException.ThrowIfNull(stream);
        ArgumentNullException.ThrowIfNull(options);
        CheckDelimiter(options.Delimiter, nameof(options));
        CheckDecimalMark(options.DecimalMark, nameof(options));
        return TableProfiler.Run(stream, options, cancellation);
    }

    /// <summary>Opens a file, reads it once and says what is in it; see <see cref="Profile(Stream, CsvOptions, CancellationToken)"/>.</summary>
    /// <param name="open">Opens the file; the stream is disposed.</param>
    /// <param name="options">What is known of it.</param>
    /// <param name="cancellation">Stops the reading.</param>
    /// <exception cref="IntakeRefusedException">As there.</exception>
    public static TableProfile Profile(Func<Stream> open, CsvOptions options, CancellationToken cancellation = default)
    {
        ArgumentNullException.ThrowIfNull(open);
        using var stream = open();
        return Profile(stream, options, cancellation);
    }

    /// <summary>Reads chosen columns into memory, in the order asked.</summary>
    /// <param name="stream">The file, read forward only; not disposed.</param>
    /// <param name="dialect">How it is written, as its profile says.</param>
    /// <param name="columns">The columns, no name twice.</param>
    /// <param name="cancellation">Stops the reading.</param>
    /// <exception cref="IntakeRefusedException">A cell is no number, or no listed category; a column is not in the file; what <see cref="Profile(Stream, CsvOptions, CancellationToken)"/> refuses of rows, header and text.</exception>
    /// <exception cref="ArgumentException">A column is asked for twice, or the dialect is not known.</exception>
    public static DataTable Read(Stream stream, CsvDialect dialect, IReadOnlyList<ColumnRequest> columns, CancellationToken cancellation = default)
    {
        ArgumentNullException.ThrowIfNull(stream);
        ArgumentNullException.ThrowIfNull(dialect);
        ArgumentNullException.ThrowIfNull(columns);
        CheckDelimiter(dialect.Delimiter, nameof(dialect));
        CheckDecimalMark(dialect.DecimalMark, nameof(dialect));
        return ColumnReader.Run(stream, dialect, columns, cancellation);
    }

    private static void CheckDelimiter(char? delimiter, string parameter)
    {
        if (delimiter is { } c && !DelimiterDetection.Candidates.Contains(c))
        {
            throw new ArgumentException($"The delimiter is a comma, semicolon, tab or vertical bar, not '{c}'.", parameter);
        }
    }

    private static void CheckDecimalMark(char? mark, string parameter)
    {
        if (mark is { } c && !DecimalMarks.Contains(c))
        {
            throw new ArgumentException($"The decimal mark is a point or a comma, not '{c}'.", parameter);
        }
    }
}
