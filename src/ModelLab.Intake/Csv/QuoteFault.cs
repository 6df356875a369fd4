using CsvHelper;

namespace ModelLab.Intake.Csv;

/// <summary>Where and how a record breaks the quoting rules of RFC 4180, section 2, rules 5 to 7.</summary>
internal static class QuoteFault
{
    /// <summary>What is wrong and what to do.</summary>
    internal static string Message(CsvMalformedReason reason) => reason switch
    {
        CsvMalformedReason.UnterminatedQuote =>
            "A quote opened in this cell is never closed. Close it, or double a quote that is meant as text (\"\") and enclose the cell in quotes.",
        CsvMalformedReason.TextAfterClosingQuote =>
            "Text follows the closing quote of this cell. Where the quote is meant as text, double it (\"\"); where it closes the cell, a delimiter must follow. If the cell runs over several lines, a quote opened in this row was not closed.",
        _ => "A quote stands inside a cell that is not enclosed in quotes. Enclose the whole cell in quotes and double the quote inside it (\"\").",
    };

    /// <summary>Zero-based column of the first cell of a record that breaks the rules.</summary>
    /// <param name="record">The record as it stands in the file (UTF-8).</param>
    /// <param name="delimiter">Between cells.</param>
    internal static int Column(ReadOnlySpan<byte> record, char delimiter)
    {
        const byte quote = (byte)'"';
        var column = 0;
        var i = 0;
        while (i < record.Length)
        {
            if (record[i] == quote)
            {
                i++;
                while (i < record.Length && (record[i] != quote || (i + 1 < record.Length && record[i + 1] == quote)))
                {
                    i += record[i] == quote ? 2 : 1;
                }

                i++;
                if (i > record.Length || (i < record.Length && record[i] != delimiter))
                {
                    return column;
                }
            }
            else
            {
                while (i < record.Length && record[i] != delimiter)
                {
                    if (record[i] == quote)
                    {
                        return column;
                    }

                    i++;
                }
            }

            i++;
            column++;
        }

        return Math.Max(0, column - 1);
    }
}
