using ModelLab.Intake.Csv;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Datasets;

/// <summary>What was seen of a dataset's columns when it was read, by name of the variable. Copied from the source, so kept sealed.</summary>
public sealed class SourceContents
{
    private static readonly char[] Around = [' ', '\t', '\r', '\n', '\u00A0'];

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

    /// <summary>The same, or null where there is no such column.</summary>
    public ColumnProfile? Find(string name) => byName.GetValueOrDefault(name);

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

    /// <summary>Indexes of the categories of a variable that its missing codes leave, ascending. Spaces around a text do not count, as in the file.</summary>
    public IReadOnlyList<int> Present(string name, IReadOnlyList<string> missingCodes)
    {
        var categories = Categories(name);
        return [.. Enumerable.Range(0, categories.Count).Where(i => !missingCodes.Contains(categories[i].Trim(Around), StringComparer.Ordinal))];
    }

    /// <summary>Index of the category against which the others of a variable are read: the one chosen, else the first; null where it has none.</summary>
    public int? Reference(VariableView variable)
    {
        var present = Present(variable.Name, variable.MissingCodes);
        return variable.ReferenceCategory is { } chosen && present.Contains(chosen) ? chosen : present.Count > 0 ? present[0] : null;
    }
}
