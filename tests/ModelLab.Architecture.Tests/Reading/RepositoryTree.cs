namespace ModelLab.Architecture.Tests.Reading;

/// <summary>A text file of the tree: its path from the top with forward slashes, and its text.</summary>
public sealed record TextFile(string Path, string Text)
{
    /// <summary>The lines of the text; a line break at the very end opens no further line.</summary>
    public IReadOnlyList<string> Lines => Text.TrimEnd('\n').Split('\n');
}

/// <summary>The files of the tree as they lie on disk, without what builds and runs leave behind.</summary>
public static class RepositoryTree
{
    // The folders that .gitignore names, and the version control's own.
    private static readonly HashSet<string> LeftBehind =
        new(StringComparer.Ordinal) { ".git", "artifacts", "bin", "obj", "data", "TestResults", ".vs", ".idea" };

    /// <summary>Top folder: the one that holds the solution, above the running test.</summary>
    public static string Top { get; } = FindTop();

    /// <summary>All files, by their paths from the top in ordinal order.</summary>
    public static IReadOnlyList<string> Files { get; } =
        [.. Walk(new DirectoryInfo(Top)).Select(f => System.IO.Path.GetRelativePath(Top, f).Replace('\\', '/')).Order(StringComparer.Ordinal)];

    /// <summary>Reads one file of the tree as text.</summary>
    public static TextFile Read(string path) => new(path, File.ReadAllText(System.IO.Path.Combine(Top, path)).Replace("\r\n", "\n", StringComparison.Ordinal));

    /// <summary>All files that hold text: those without a zero byte.</summary>
    public static IEnumerable<TextFile> TextFiles() => Files
        .Where(path => !File.ReadAllBytes(System.IO.Path.Combine(Top, path)).AsSpan().Contains((byte)0))
        .Select(Read);

    /// <summary>All project files.</summary>
    public static IEnumerable<TextFile> Projects(string below) => Files
        .Where(path => path.StartsWith(below, StringComparison.Ordinal) && path.EndsWith(".csproj", StringComparison.Ordinal))
        .Select(Read);

    private static IEnumerable<string> Walk(DirectoryInfo folder) => folder.EnumerateFiles().Where(f => f.Extension != ".user").Select(f => f.FullName)
        .Concat(folder.EnumerateDirectories().Where(d => !LeftBehind.Contains(d.Name)).SelectMany(Walk));

    private static string FindTop()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (folder is not null && !File.Exists(System.IO.Path.Combine(folder.FullName, "ModelLab.sln")))
        {
            folder = folder.Parent;
        }

        return folder?.FullName ?? throw new InvalidOperationException("No folder above the test holds ModelLab.sln; run the tests from where they were built.");
    }
}
