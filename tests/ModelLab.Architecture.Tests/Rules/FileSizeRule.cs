using ModelLab.Architecture.Tests.Reading;

namespace ModelLab.Architecture.Tests.Rules;

/// <summary>A source file fits on a few screens; one that does not holds two things.</summary>
public static class FileSizeRule
{
    /// <summary>The largest number of lines.</summary>
    public const int Most = 500;

    private static readonly string[] Written = [".cs", ".razor", ".css", ".js", ".sql"];

    /// <summary>Whether a file of the tree is written by hand under src/. Migrations are written by a tool.</summary>
    public static bool Covers(string path) => path.StartsWith("src/", StringComparison.Ordinal)
        && !path.Contains("/Migrations/", StringComparison.Ordinal)
        && Written.Contains(Path.GetExtension(path));

    /// <summary>Files with more lines than a file may have.</summary>
    public static IEnumerable<string> Violations(IEnumerable<TextFile> files) => files
        .Where(f => Covers(f.Path) && f.Lines.Count > Most)
        .Select(f => $"{f.Path} has {f.Lines.Count} lines");
}
