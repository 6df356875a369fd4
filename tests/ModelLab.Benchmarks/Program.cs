using System.Globalization;
using ModelLab.Benchmarks;

// dotnet run -c Release -- [--rounds N] [--only PART] [--table-rows N]
//   --rounds N       rounds of each workload (15)
//   --only PART      only workloads whose name holds PART
//   --table-rows N   rows of the large text table (1000000)
// CPU times on one thread; the ratio of each round is taken before the median, so a busy machine changes times more than ratios.
// Peers need python3 with numpy (Debian: python3-numpy; statsmodels and pandas are taken too where they are installed).
var rounds = int.Parse(Option("--rounds") ?? "15", CultureInfo.InvariantCulture);
var only = Option("--only") ?? string.Empty;
var tableRows = int.Parse(Option("--table-rows") ?? "1000000", CultureInfo.InvariantCulture);
var folder = Directory.CreateTempSubdirectory("modellab-benchmarks-").FullName;
try
{
    var small = new RegressionData(500, 20, 1);
    var large = new RegressionData(1000, 30, 2);
    small.WriteRaw(Path.Combine(folder, "fit-500x20.bin"));
    large.WriteRaw(Path.Combine(folder, "fit-1000x30.bin"));
    await using var stored = new StoredElimination(large, Path.Combine(folder, "store"));
    var wantsTable = new[] { "profile", "read" }.Any(w => $"{w} large text table".Contains(only, StringComparison.OrdinalIgnoreCase));
    var table = new LargeTable(Path.Combine(folder, "large.csv"), wantsTable ? tableRows : 1);

    using var peers = PeerProcess.Start(folder);
    if (peers is null)
    {
        Console.WriteLine("Without python3 and numpy there are no peers; our own times stand alone.");
    }

    Workload[] workloads =
    [
        new("one fit, 500 x 20", () => Fitting.Fit(small, small.Terms), ["fit-500x20-numpy", "fit-500x20-statsmodels"]),
        new("one fit, 1,000 x 30", () => Fitting.Fit(large, large.Terms), ["fit-1000x30-numpy", "fit-1000x30-statsmodels"]),
        new("elimination from 30, n 1,000, engine", () => Fitting.Eliminate(large), ["eliminate-1000x30-numpy", "eliminate-1000x30-statsmodels"]),
        new("elimination from 30, n 1,000, all stored", stored.Run, ["eliminate-1000x30-numpy", "eliminate-1000x30-statsmodels"]),
        new("profile large text table", table.Profile, ["read-large-pandas"], 3),
        new("read large text table", table.Read, ["read-large-pandas"], 3),
    ];
    var measuring = new Measuring(rounds, peers);
    var measurements = new List<Measurement>();
    foreach (var workload in workloads.Where(w => w.Name.Contains(only, StringComparison.OrdinalIgnoreCase)))
    {
        Console.WriteLine($"... {workload.Name}");
        measurements.AddRange(measuring.Measure(workload));
    }

    Console.WriteLine();
    ResultTable.Write(Console.Out, measurements);
    Console.WriteLine();
    Console.WriteLine($"The elimination keeps {Fitting.Eliminate(large).Count} of 30 terms; stored, it made {stored.Revisions} revisions. Large table: {table.Bytes / 1e6:0} MB.");
}
finally
{
    Directory.Delete(folder, recursive: true);
}

string? Option(string name) => Array.IndexOf(args, name) is var at and >= 0 && at + 1 < args.Length ? args[at + 1] : null;
