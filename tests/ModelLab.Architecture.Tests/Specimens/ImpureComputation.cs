using System.Diagnostics;
using System.Text.Json;

namespace ModelLab.Architecture.Tests.Specimens;

/// <summary>Breaks the rule of pure computation in each of its ways, on purpose.</summary>
public sealed class ImpureComputation
{
    private readonly Random random = new(1);

    public static string ReadsAFile(string path) => File.ReadAllText(path);

    public static string WritesJson(double value) => JsonSerializer.Serialize(value);

    public static long TakesTheTime() => TimeProvider.System.GetTimestamp();

    public static long WatchesTheTime() => Stopwatch.GetTimestamp();

    public static int CountsTicks() => Environment.TickCount;

    public static void Speaks() => Console.WriteLine();

    public double Draws() => random.NextDouble();

    public static int Harmless() => Environment.ProcessorCount;
}
