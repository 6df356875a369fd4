namespace ModelLab.Statistics.Tests;

/// <summary>Reads the fixtures that are copied beside the tests.</summary>
public static class FixtureLines
{
    /// <summary>The lines below the header, cut at commas; lines that start with # are remarks.</summary>
    public static IReadOnlyList<string[]> Read(string path) =>
        [.. All(path).Where(line => !line.StartsWith('#')).Skip(1).Select(line => line.Split(','))];

    /// <summary>The remarks of the form <c># name = value</c>.</summary>
    public static IReadOnlyDictionary<string, string> Remarks(string path) =>
        All(path).Where(line => line.StartsWith('#') && line.Contains('=', StringComparison.Ordinal))
            .Select(line => line[1..].Split('=', 2))
            .ToDictionary(parts => parts[0].Trim(), parts => parts[1].Trim(), StringComparer.Ordinal);

    private static IEnumerable<string> All(string path)
    {
        var lines = File.ReadAllLines(Path.Combine(AppContext.BaseDirectory, "Fixtures", path));
        Assert.NotEmpty(lines);
        return lines.Where(line => line.Length > 0);
    }
}
