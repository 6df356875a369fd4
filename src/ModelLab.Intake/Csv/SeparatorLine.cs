namespace ModelLab.Intake.Csv;

/// <summary>A first line <c>sep=;</c>, by which some spreadsheets name the delimiter (common practice). It is no part of the table.</summary>
internal static class SeparatorLine
{
    /// <summary>Whether a first record is such a line.</summary>
    internal static bool Is(ReadOnlySpan<byte> record) => record.Length == 5 && System.Text.Ascii.EqualsIgnoreCase(record[..4], "sep=");

    /// <summary>The delimiter that the text names in its first line, or null.</summary>
    internal static char? Delimiter(ReadOnlySpan<byte> text)
    {
        var end = text.IndexOfAny((byte)'\r', (byte)'\n');
        var line = end < 0 ? text : text[..end];
        return Is(line) && DelimiterDetection.Candidates.Contains((char)line[4]) ? (char)line[4] : null;
    }
}
