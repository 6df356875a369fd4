using ModelLab.Projects.Entries;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Modelling;

/// <summary>Complete cases: the rows without a missing value in any of the columns.</summary>
/// <param name="Rows">Zero-based, ascending.</param>
/// <param name="Losses">For each column with missing values: how many rows it costs, and how many it alone.</param>
public sealed record CompleteRows(int[] Rows, IReadOnlyList<RowLoss> Losses)
{
    /// <summary>Finds them among the rows given.</summary>
    public static CompleteRows Find(IReadOnlyList<Column> columns, ReadOnlySpan<int> among)
    {
        var missing = new long[columns.Count];
        var alone = new long[columns.Count];
        var complete = new List<int>(among.Length);
        foreach (var row in among)
        {
            var gaps = 0;
            var last = -1;
            for (var c = 0; c < columns.Count; c++)
            {
                if (columns[c].IsMissing(row))
                {
                    missing[c]++;
                    gaps++;
                    last = c;
                }
            }

            if (gaps == 0)
            {
                complete.Add(row);
            }
            else if (gaps == 1)
            {
                alone[last]++;
            }
        }

        return new CompleteRows(
            [.. complete],
            [.. Enumerable.Range(0, columns.Count).Where(c => missing[c] > 0).Select(c => new RowLoss(columns[c].Name, missing[c], alone[c]))]);
    }
}
