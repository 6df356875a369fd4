using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Tests;

/// <summary>Reads a table of observations among the fixtures: numbers as written, categories in ordinal order.</summary>
public static class FixtureTable
{
    public static DataTable Read(string path, params string[] categorical)
    {
        var lines = File.ReadAllLines(Path.Combine(AppContext.BaseDirectory, "Fixtures", path)).Where(line => line.Length > 0 && line[0] != '#').ToArray();
        var names = lines[0].Split(',');
        var cells = lines.Skip(1).Select(line => line.Split(',')).ToArray();
        return new DataTable([.. names.Select((name, at) => categorical.Contains(name)
            ? (Column)Categories(name, [.. cells.Select(row => row[at])])
            : Numbers(name, [.. cells.Select(row => row[at])]))]);
    }

    /// <summary>Rows without a missing value in any of the columns named.</summary>
    public static int[] CompleteRows(DataTable table, params string[] names) =>
        [.. Enumerable.Range(0, table.Rows).Where(row => names.All(name => !table.Find(name)!.IsMissing(row)))];

    public static NumberColumn Numbers(string name, IReadOnlyList<string> cells)
    {
        var values = new double[cells.Count];
        var remainders = new double[cells.Count];
        for (var row = 0; row < cells.Count; row++)
        {
            if (cells[row].Length == 0)
            {
                values[row] = double.NaN;
                continue;
            }

            Assert.True(DecimalReader.TryRead(cells[row], '.', out values[row], out remainders[row]), $"'{cells[row]}' is no number");
        }

        return new NumberColumn(name, values, remainders);
    }

    public static CategoryColumn Categories(string name, IReadOnlyList<string> cells, string? reference = null)
    {
        var categories = cells.Where(cell => cell.Length > 0).Distinct().Order(StringComparer.Ordinal).ToArray();
        return new CategoryColumn(
            name,
            [.. cells.Select(cell => Array.IndexOf(categories, cell))],
            categories,
            reference is null ? 0 : Array.IndexOf(categories, reference));
    }
}
