using CsvHelper;

namespace ModelLab.Intake.Csv;

/// <summary>
/// Finds the delimiter of a text table from its first records, quotes honoured: the one that cuts the most of them into as many
/// cells as the header, then the one that makes more columns. A text that no candidate cuts is a table of one column.
/// </summary>
internal static class DelimiterDetection
{
    /// <summary>Bytes of text looked at.</summary>
    internal const int LookAhead = 1 << 20;

    private const int MostRecords = 200;

    /// <summary>The delimiters known; earlier ones win a tie, since the comma is also a decimal mark and the most common sign in texts.</summary>
    internal static IReadOnlyList<char> Candidates { get; } = ['\t', ';', '|', ','];

    /// <summary>Finds the delimiter.</summary>
    /// <param name="head">The beginning of the text (UTF-8).</param>
    /// <param name="complete">Whether that is the whole text.</param>
    internal static char Find(ReadOnlyMemory<byte> head, bool complete)
    {
        if (SeparatorLine.Delimiter(head.Span) is { } named)
        {
            return named;
        }

        var fits = Candidates.Select(candidate => Fit.Of(head, complete, candidate)).ToArray();
        var best = fits.Where(f => f.HeaderCells > 1).OrderByDescending(f => f.Share).ThenByDescending(f => f.HeaderCells).FirstOrDefault();
        if (best is not null)
        {
            return best.Delimiter;
        }

        // one name above rows of several cells: that delimiter, so that the rows are refused with their counts
        var cut = fits.FirstOrDefault(f => f.RowsCutAlike);
        if (cut is not null)
        {
            return cut.Delimiter;
        }

        return fits.Reverse().First(f => f.Share >= fits.Max(other => other.Share)).Delimiter;
    }

    /// <summary>How well a delimiter fits.</summary>
    /// <param name="Delimiter">The candidate.</param>
    /// <param name="HeaderCells">Cells of the header.</param>
    /// <param name="Share">Share of the other records with as many cells.</param>
    /// <param name="RowsCutAlike">Whether all other records have one and the same number of cells, above one, and there are at least two.</param>
    private sealed record Fit(char Delimiter, int HeaderCells, double Share, bool RowsCutAlike)
    {
        internal static Fit Of(ReadOnlyMemory<byte> head, bool complete, char delimiter)
        {
            var counts = Counts(head, complete, delimiter);
            if (counts.Count == 0)
            {
                return new Fit(delimiter, 0, 0, false);
            }

            var rows = counts.Skip(1).ToArray();
            return new Fit(
                delimiter,
                counts[0],
                rows.Length == 0 ? 1 : (double)rows.Count(c => c == counts[0]) / rows.Length,
                rows.Length > 1 && rows[0] > 1 && rows.All(c => c == rows[0]));
        }

        private static List<int> Counts(ReadOnlyMemory<byte> head, bool complete, char delimiter)
        {
            var counts = new List<int>();
            using var records = CsvReader.Create(head, new CsvReaderOptions
            {
                Separator = delimiter,
                HasHeader = false,
                SkipEmptyLines = true,
                DetectSeparatorHint = false,
                MalformedData = CsvMalformedDataHandling.Recover,
            });
            while (counts.Count <= MostRecords && records.Read())
            {
                if (records.FieldCount > 1 || records.RawRecord.IndexOfAnyExcept((byte)' ', (byte)'\t') >= 0)
                {
                    counts.Add(records.FieldCount);
                }
            }

            if (!complete && counts.Count is > 1 and <= MostRecords)
            {
                counts.RemoveAt(counts.Count - 1);
            }

            return counts;
        }
    }
}
