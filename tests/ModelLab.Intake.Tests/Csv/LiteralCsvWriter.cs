using System.Text;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>Writes a table letter by letter as the grammar of RFC 4180 (section 2) has it, apart from the delimiter: knows nothing of the reader.</summary>
internal static class LiteralCsvWriter
{
    internal static string Write(IReadOnlyList<IReadOnlyList<string>> records, char delimiter, string lineEnd, Func<int, bool> quoteAnyway, bool lastLineEnd)
    {
        var text = new StringBuilder();
        var cell = 0;
        for (var r = 0; r < records.Count; r++)
        {
            for (var f = 0; f < records[r].Count; f++)
            {
                if (f > 0)
                {
                    text.Append(delimiter);
                }

                var field = records[r][f];
                var needed = field.Length == 0 && records[r].Count == 1;
                foreach (var c in field)
                {
                    needed |= c == delimiter || c == '"' || c == '\r' || c == '\n';
                }

                // blank lines and lines of spaces alone would be left out at the end
                needed |= records[r].Count == 1 && string.IsNullOrWhiteSpace(field);
                if (!needed && !quoteAnyway(cell++))
                {
                    text.Append(field);
                    continue;
                }

                text.Append('"');
                foreach (var c in field)
                {
                    text.Append(c == '"' ? "\"\"" : c.ToString());
                }

                text.Append('"');
            }

            if (r < records.Count - 1 || lastLineEnd)
            {
                text.Append(lineEnd);
            }
        }

        return text.ToString();
    }
}
