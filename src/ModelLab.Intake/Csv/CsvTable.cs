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
/// <param name="MissingCodes">Texts that mean missing, besides the empty cell.</param>
/// <param name="Categories">For categories: their texts in order; null: all texts met, in ordinal order. A text outside is refused with its row.</param>
/// <param name="Reference">For categories: the reference category's text; null: the first.</param>
public sealed record ColumnRequest(string Name, bool Numeric, IReadOnlyList<string> MissingCodes, IReadOnlyList<string>? Categories = null, string? Reference = null);

/// <summary>Reads text tables by streaming.</summary>
public static class CsvTable
{
    /// <summary>Version of the reading, kept with every dataset.</summary>
    public const string MethodVersion = "csv-reading/1";

    /// <summary>Reads a whole file once and says what is in it, without keeping it.</summary>
    /// <exception cref="IntakeRefusedException">No text table; ragged rows; duplicate or empty headers; undecodable text. Rows and columns are named.</exception>
    public static TableProfile Profile(Stream stream, CsvOptions options, CancellationToken cancellation = default) => throw new NotImplementedException();

    /// <summary>Reads chosen columns into memory, in the order asked.</summary>
    /// <exception cref="IntakeRefusedException">A cell is no number, or no listed category.</exception>
    public static DataTable Read(Stream stream, CsvDialect dialect, IReadOnlyList<ColumnRequest> columns, CancellationToken cancellation = default) => throw new NotImplementedException();
}
