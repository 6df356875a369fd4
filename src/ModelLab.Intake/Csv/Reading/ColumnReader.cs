using ModelLab.Intake.Text;
using ModelLab.Statistics.Designs;

namespace ModelLab.Intake.Csv.Reading;

/// <summary>Reads chosen columns of a file into memory; the others are passed over.</summary>
internal static class ColumnReader
{
    private const int RowsBetweenCancellationChecks = 1024;

    /// <summary>Reads the columns in the order asked.</summary>
    internal static DataTable Run(Stream stream, CsvDialect dialect, IReadOnlyList<ColumnRequest> requests, CancellationToken cancellation)
    {
        var asked = new HashSet<string>(StringComparer.Ordinal);
        foreach (var request in requests)
        {
            if (!asked.Add(request.Name))
            {
                throw new ArgumentException($"The column '{request.Name}' is asked for twice.", nameof(requests));
            }
        }

        using var text = new SourceText(stream, dialect.Encoding);
        using var records = RecordReader.Open(text, dialect.Delimiter);
        var places = Places(records, requests);
        var builders = requests.Select(r => r.Numeric ? new NumberColumnBuilder(r, dialect.DecimalMark) : (ColumnBuilder)new CategoryColumnBuilder(r)).ToArray();
        while (records.Read())
        {
            if (records.Row % RowsBetweenCancellationChecks == 0)
            {
                cancellation.ThrowIfCancellationRequested();
            }

            if (records.Row > Array.MaxLength)
            {
                throw records.Problems.Refusal(records.Row, null, "The table has more rows than fit into memory. Split the file.");
            }

            for (var i = 0; i < builders.Length; i++)
            {
                if (builders[i].Add(records[places[i]]) is { } wrong)
                {
                    records.Problems.Add(records.Row, requests[i].Name, wrong);
                }
            }
        }

        return new DataTable([.. builders.Select(b => b.Build())]);
    }

    private static int[] Places(RecordReader records, IReadOnlyList<ColumnRequest> requests)
    {
        var byName = new Dictionary<string, int>(StringComparer.Ordinal);
        for (var i = 0; i < records.Names.Count; i++)
        {
            byName.TryAdd(records.Names[i], i);
        }

        var places = new int[requests.Count];
        for (var i = 0; i < places.Length; i++)
        {
            if (!byName.TryGetValue(requests[i].Name, out places[i]))
            {
                records.Problems.Add(null, requests[i].Name, "The file has no column of this name. Compare it with the names in the first row.");
            }
        }

        records.Problems.ThrowIfAny();
        return places;
    }
}
