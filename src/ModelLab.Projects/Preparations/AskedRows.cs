using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Preparations;

/// <summary>Checks the rows that a step leaves out or brings back.</summary>
public static class AskedRows
{
    private const int MostNamed = 20;

    /// <summary>The row numbers, each once, ascending.</summary>
    /// <exception cref="RefusedException">None is named, or one is not in the source.</exception>
    public static IReadOnlyList<long> Of(SourceView source, IReadOnlyList<long>? rows)
    {
        if (rows is null || rows.Count == 0)
        {
            throw RefusedException.Invalid("Name the rows by their numbers in the source (1 = first row below the header).", "rows");
        }

        foreach (var row in rows)
        {
            if (row < 1 || row > source.Rows)
            {
                throw RefusedException.Invalid($"There is no row {row}; the source has rows 1 to {source.Rows}.", "rows");
            }
        }

        return [.. rows.Distinct().Order()];
    }

    /// <summary>Refuses to leave out what is left out already.</summary>
    public static void RequireKept(PreparationStep step, int[] kept)
    {
        var there = kept.ToHashSet();
        Refuse([.. step.Rows!.Where(r => !there.Contains((int)(r - 1)))], "left out already.");
    }

    /// <summary>
    /// Refuses to bring back what no step excluded, and what complete cases asked for by another step would not hold: rows lost to
    /// missing values come back with another preparation, not one by one.
    /// </summary>
    public static async Task RequireExcludedAsync(
        DatasetColumns columns, string projectId, SourceView source, PreparationStep step, DataDictionary dictionary,
        IReadOnlyList<PreparationStep> before, int[] kept, CancellationToken cancellation)
    {
        var there = kept.ToHashSet();
        Refuse([.. step.Rows!.Where(r => there.Contains((int)(r - 1)))], "not left out.");
        var excluded = new HashSet<long>();
        foreach (var earlier in before)
        {
            if (earlier.Kind == StepKind.ExcludeRows)
            {
                excluded.UnionWith(earlier.Rows!);
            }
            else if (earlier.Kind == StepKind.RestoreRows)
            {
                excluded.ExceptWith(earlier.Rows!);
            }
        }

        Refuse([.. step.Rows!.Where(r => !excluded.Contains(r))], "not left out by anybody, but lost to missing values (complete cases). Make a preparation without that step.");
        int[] rows = [.. step.Rows!.Select(r => (int)(r - 1))];
        foreach (var earlier in before.Where(s => s.Kind == StepKind.CompleteCases))
        {
            var complete = (await KeptRows.CompleteAsync(columns, projectId, source, earlier, dictionary, rows, cancellation)).Rows.ToHashSet();
            Refuse([.. rows.Where(r => !complete.Contains(r)).Select(r => (long)r + 1)], $"missing in a variable of which step {earlier.Id} keeps complete cases alone.");
        }
    }

    private static void Refuse(IReadOnlyList<long> rows, string because)
    {
        if (rows.Count > 0)
        {
            var more = rows.Count > MostNamed ? $" and {rows.Count - MostNamed} more" : string.Empty;
            throw RefusedException.Invalid($"Row{(rows.Count == 1 ? string.Empty : "s")} {string.Join(", ", rows.Take(MostNamed))}{more} {(rows.Count == 1 ? "is" : "are")} {because}", "rows");
        }
    }
}
