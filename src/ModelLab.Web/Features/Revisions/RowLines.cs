using System.Globalization;
using System.Text;
using System.Text.Json;
using ModelLab.Projects.Revisions;

namespace ModelLab.Web.Features.Revisions;

/// <summary>Writes row-wise results line by line, so that a million rows take no more memory than a thousand.</summary>
public static class RowLines
{
    private const int FlushEvery = 1000;

    /// <summary>A JSON array of one object a row; what is undefined is null.</summary>
    public static async Task WriteJsonAsync(Stream body, RowReading rows, IReadOnlyList<RowStatistic> statistics, CancellationToken cancellation)
    {
        await using var writer = new Utf8JsonWriter(body);
        writer.WriteStartArray();
        for (var i = 0; i < rows.RowNumbers.Count; i++)
        {
            writer.WriteStartObject();
            writer.WriteNumber("row", rows.RowNumbers[i]);
            foreach (var statistic in statistics)
            {
                if (Value(statistic, rows, i) is { } value)
                {
                    writer.WriteNumber(statistic.Name, value);
                }
                else
                {
                    writer.WriteNull(statistic.Name);
                }
            }

            writer.WriteEndObject();
            if (i % FlushEvery == 0)
            {
                await writer.FlushAsync(cancellation);
            }
        }

        writer.WriteEndArray();
        await writer.FlushAsync(cancellation);
    }

    /// <summary>CSV after RFC 4180: a header, CR LF at line ends, decimals with a point, what is undefined empty. All cells are numbers, so that none can be taken for a formula.</summary>
    public static async Task WriteCsvAsync(Stream body, RowReading rows, IReadOnlyList<RowStatistic> statistics, CancellationToken cancellation)
    {
        await using var writer = new StreamWriter(body, new UTF8Encoding(encoderShouldEmitUTF8Identifier: false), leaveOpen: true) { NewLine = "\r\n" };
        await writer.WriteLineAsync(string.Join(',', statistics.Select(s => s.Name).Prepend("row")));
        var line = new StringBuilder();
        for (var i = 0; i < rows.RowNumbers.Count; i++)
        {
            cancellation.ThrowIfCancellationRequested();
            line.Clear().Append(rows.RowNumbers[i]);
            foreach (var statistic in statistics)
            {
                line.Append(',').Append(Value(statistic, rows, i)?.ToString("R", CultureInfo.InvariantCulture));
            }

            await writer.WriteLineAsync(line, cancellation);
        }
    }

    private static double? Value(RowStatistic statistic, RowReading rows, int i) => statistic.Of(rows, i) is { } value && double.IsFinite(value) ? value : null;
}
