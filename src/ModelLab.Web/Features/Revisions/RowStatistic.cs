using ModelLab.Projects;
using ModelLab.Projects.Revisions;

namespace ModelLab.Web.Features.Revisions;

/// <summary>A column of row-wise results.</summary>
/// <param name="Name">Its name in the API.</param>
/// <param name="Of">Its value at a position among the rows.</param>
public sealed record RowStatistic(string Name, Func<RowReading, int, double?> Of)
{
    /// <summary>All of them, in the order in which they are written.</summary>
    public static IReadOnlyList<RowStatistic> All { get; } =
    [
        new("observed", (r, i) => r.Observed[i]),
        new("fitted", (r, i) => r.Results.Fitted[i]),
        new("residual", (r, i) => r.Results.Residual[i]),
        new("leverage", (r, i) => r.Results.Leverage[i]),
        new("studentizedInternal", (r, i) => r.Results.StudentizedInternal[i]),
        new("studentizedExternal", (r, i) => r.Results.StudentizedExternal[i]),
        new("cooksDistance", (r, i) => r.Results.CooksDistance[i]),
    ];

    /// <summary>The columns that a query names.</summary>
    /// <exception cref="RefusedException">One is not known; all that are not are named.</exception>
    public static IReadOnlyList<RowStatistic> Named(string? names)
    {
        if (names is null)
        {
            return All;
        }

        var asked = names.Split(',', StringSplitOptions.TrimEntries | StringSplitOptions.RemoveEmptyEntries);
        var unknown = asked.Where(n => All.All(s => s.Name != n)).ToList();
        if (unknown.Count > 0 || asked.Length == 0)
        {
            throw new RefusedException(
                RefusalKind.Invalid,
                $"Not known among the row-wise statistics: {(unknown.Count == 0 ? "(nothing was named)" : string.Join(", ", unknown))}. There are {string.Join(", ", All.Select(s => s.Name))}.",
                [.. unknown.Select(n => new RefusalDetail(null, n, "This row-wise statistic is not known."))]);
        }

        return [.. asked.Distinct(StringComparer.Ordinal).Select(n => All.First(s => s.Name == n))];
    }
}
