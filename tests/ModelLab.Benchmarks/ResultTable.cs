using System.Globalization;

namespace ModelLab.Benchmarks;

/// <summary>Prints measurements as one table.</summary>
public static class ResultTable
{
    /// <summary>Writes it.</summary>
    public static void Write(TextWriter writer, IReadOnlyList<Measurement> measurements)
    {
        var width = measurements.Max(m => m.Name.Length);
        writer.WriteLine($"{"workload".PadRight(width)}  {"ours, ms",12}  {"peer, ms",12}  {"times faster",12}  peer");
        foreach (var m in measurements)
        {
            writer.WriteLine($"{m.Name.PadRight(width)}  {Number(m.OursMilliseconds),12}  {Number(m.PeerMilliseconds),12}  {Number(m.Ratio),12}  {m.Peer ?? "-"}");
        }
    }

    private static string Number(double? value) => value is not { } v ? "-" : v.ToString(v >= 100 ? "0" : v >= 1 ? "0.00" : "0.0000", CultureInfo.InvariantCulture);
}
