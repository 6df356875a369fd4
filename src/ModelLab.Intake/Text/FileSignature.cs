namespace ModelLab.Intake.Text;

/// <summary>
/// Tells by the first bytes that a file is no text table. Signatures: the byte order marks of the Unicode Standard 23.8,
/// and the published formats' own (ZIP appnote 4.3.7, ISO 32000-1 7.5.2, RFC 1952 2.3.1, PNG 5.2, JFIF, GIF89a, MS-CFB 2.2, Parquet).
/// </summary>
internal static class FileSignature
{
    /// <summary>Bytes that must be at hand for <see cref="Refusal"/>.</summary>
    internal const int Length = 16;

    /// <summary>Why these bytes begin no text table and what to do, or null.</summary>
    internal static string? Refusal(ReadOnlySpan<byte> head)
    {
        if (head.StartsWith<byte>([0xFF, 0xFE, 0x00, 0x00]) || head.StartsWith<byte>([0x00, 0x00, 0xFE, 0xFF]))
        {
            return "The file is written in UTF-32. Save it again as UTF-8 and upload that.";
        }

        if (head.StartsWith<byte>([0xFF, 0xFE]) || head.StartsWith<byte>([0xFE, 0xFF]))
        {
            return "The file is written in UTF-16. Save it again as UTF-8 and upload that.";
        }

        if (head.StartsWith("PK\u0003\u0004"u8) || head.StartsWith("PK\u0005\u0006"u8))
        {
            return "The file is a workbook or a ZIP archive, not a text table. Save the sheet as CSV (UTF-8), or unpack the archive, and upload that.";
        }

        if (head.StartsWith<byte>([0xD0, 0xCF, 0x11, 0xE0]))
        {
            return "The file is an old binary workbook or document, not a text table. Save the sheet as CSV (UTF-8) and upload that.";
        }

        if (head.StartsWith<byte>([0x1F, 0x8B]))
        {
            return "The file is compressed. Unpack it and upload the text table inside.";
        }

        if (head.StartsWith("%PDF-"u8))
        {
            return "The file is a PDF document. Upload the table itself as CSV (UTF-8).";
        }

        if (head.StartsWith("PAR1"u8))
        {
            return "The file is a Parquet table. Export it as CSV (UTF-8) and upload that.";
        }

        if (head.StartsWith<byte>([0x89, 0x50, 0x4E, 0x47]) || head.StartsWith<byte>([0xFF, 0xD8, 0xFF]) || head.StartsWith("GIF8"u8))
        {
            return "The file is a picture. Upload the table itself as CSV (UTF-8).";
        }

        return StartsAsMarkup(head) ? "The file is a web page or XML, not a text table. Export the table as CSV (UTF-8) and upload that." : null;
    }

    private static bool StartsAsMarkup(ReadOnlySpan<byte> head)
    {
        var text = head.StartsWith<byte>([0xEF, 0xBB, 0xBF]) ? head[3..] : head;
        foreach (var start in (ReadOnlySpan<string>)["<?xml", "<!doctype", "<html"])
        {
            if (text.Length >= start.Length && System.Text.Ascii.EqualsIgnoreCase(text[..start.Length], start))
            {
                return true;
            }
        }

        return false;
    }
}
