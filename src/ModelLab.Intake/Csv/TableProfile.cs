using System.Text.Json.Serialization;

namespace ModelLab.Intake.Csv;

/// <summary>How a text table is written. Kept on record, so that a file is read again in the same way.</summary>
/// <param name="Encoding"><c>utf-8</c> or <c>windows-1252</c>.</param>
/// <param name="ByteOrderMark">Whether a byte order mark stands before the text.</param>
/// <param name="Delimiter">',', ';', tab or '|'.</param>
/// <param name="DecimalMark">'.' or ','.</param>
public sealed record CsvDialect(string Encoding, bool ByteOrderMark, char Delimiter, char DecimalMark);

/// <summary>A question that the program puts instead of deciding by itself.</summary>
/// <param name="Code">Stable name, e.g. <c>codes-or-counts</c>, <c>direct-identifier</c>, <c>binary-outcome</c>.</param>
/// <param name="Message">The question in plain words.</param>
public sealed record IntakeQuestion(string Code, string Message);

/// <summary>One value of a column with its count.</summary>
public sealed record ValueCount(string Value, long Count);

/// <summary>What was seen of one column.</summary>
/// <param name="Name">Header text, trimmed.</param>
/// <param name="ProposedKind">The program's proposal; a person decides.</param>
/// <param name="Numeric">Whether every value that is not missing is a number in the dialect.</param>
/// <param name="Whole">Whether all of them are whole.</param>
/// <param name="Missing">Cells that are missing.</param>
/// <param name="MissingCodes">The texts that were taken as missing, in ordinal order; the empty cell as "".</param>
/// <param name="Distinct">Distinct values that are not missing; counted up to <paramref name="DistinctCapped"/>.</param>
/// <param name="DistinctCapped">True where counting stopped.</param>
/// <param name="Values">All distinct values with counts in ordinal order (numbers as written), where there are at most 100; else empty.</param>
/// <param name="Minimum">Smallest number, or null.</param>
/// <param name="Maximum">Largest number, or null.</param>
/// <param name="Questions">What a person should look at before using it.</param>
public sealed record ColumnProfile(
    string Name, VariableKind ProposedKind, bool Numeric, bool Whole, long Missing, IReadOnlyList<string> MissingCodes,
    long Distinct, bool DistinctCapped, IReadOnlyList<ValueCount> Values, double? Minimum, double? Maximum,
    IReadOnlyList<IntakeQuestion> Questions);

/// <summary>What was seen of a whole file.</summary>
public sealed record TableProfile(CsvDialect Dialect, long Rows, IReadOnlyList<ColumnProfile> Columns)
{
    /// <summary>Columns that seem to hold direct identifiers of people (names, e-mail addresses, telephone numbers, birth dates, national numbers).</summary>
    [JsonIgnore]
    public IEnumerable<ColumnProfile> DirectIdentifiers => Columns.Where(c => c.Questions.Any(q => q.Code == "direct-identifier"));
}
