using ModelLab.Intake.Csv;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Datasets;

/// <summary>What was seen of a dataset's columns when it was read, by name of the variable. Copied from the source, so kept sealed.</summary>
public sealed class SourceContents
{
    private readonly Dictionary<string, ColumnProfile> byName;

    private SourceContents(IReadOnlyList<ColumnProfile> columns) => byName = columns.ToDictionary(c => c.Name, StringComparer.Ordinal);

    /// <summary>Opens the sealed part of the dataset's entry.</summary>
    /// <exception cref="RefusedException">The source was withdrawn.</exception>
    public static async Task<SourceContents> OpenAsync(ISourceVault vault, string projectId, DatasetView dataset, CancellationToken cancellation)
    {
        var content = await vault.UnsealAsync(projectId, dataset.EntryNumber, cancellation);
        return new SourceContents(EntryKinds.ReadSealed<IReadOnlyList<ColumnProfile>>(content, "columns") ?? []);
    }

    /// <summary>The same of columns that are not recorded yet.</summary>
    public static SourceContents Of(IReadOnlyList<ColumnProfile> columns) => new(columns);

    /// <summary>What was seen of a column.</summary>
    public ColumnProfile Of(string name) => byName[name];

    /// <summary>
    /// All categories that a variable can have, in an order that never changes: the distinct values in ordinal order, then the
    /// texts first taken as missing. What the dictionary declares missing keeps its place and has no rows, so that an index
    /// means the same category for ever. Empty where there are too many to be categories.
    /// </summary>
    public IReadOnlyList<string> Categories(string name)
    {
        var column = byName[name];
        return column.Distinct > 0 && column.Values.Count == 0
            ? []
            : [.. column.Values.Select(v => v.Value), .. column.MissingCodes.Where(c => c.Length > 0)];
    }
}
