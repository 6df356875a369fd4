using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Distributions;

namespace ModelLab.Statistics.Description;

/// <summary>Correlation of two variables on the rows given.</summary>
/// <param name="First">Name of the first variable.</param>
/// <param name="Second">Name of the second variable.</param>
/// <param name="N">Rows in which neither is missing.</param>
/// <param name="R">The correlation; null where one has no spread or n &lt; 2.</param>
/// <param name="Lower">Interval by Fisher's transform, lower end; null for n &lt; 4 or |r| = 1.</param>
/// <param name="Upper">The same, upper end.</param>
/// <param name="P">Two-sided p of t = r√((n − 2)/(1 − r²)); null for n &lt; 3 or |r| = 1, where t does not exist.</param>
public sealed record Correlation(string First, string Second, int N, double? R, double? Lower, double? Upper, double? P);

/// <summary>Correlations of numeric variables, pair by pair.</summary>
public static class Correlations
{
    /// <summary>
    /// Pearson's product-moment correlations of all pairs i &lt; j in order, each on the rows (zero-based; all rows where empty)
    /// in which neither is missing. Interval by Fisher's transform (1921), artanh r ± z/√(n − 3).
    /// </summary>
    /// <exception cref="ArgumentOutOfRangeException">confidence is not between 0 and 1.</exception>
    /// <exception cref="ArgumentException">Columns differ in length, or a value is infinite.</exception>
    public static IReadOnlyList<Correlation> Pearson(IReadOnlyList<NumberColumn> columns, ReadOnlySpan<int> rows, double confidence) =>
        Pairs(columns, rows, confidence, ranks: false);

    /// <summary>
    /// Spearman's rank correlations of the same pairs: Pearson's of the ranks, ties at their mean rank. p by the t
    /// approximation; interval artanh r ± z√((1 + r²/2)/(n − 3)) (Bonett and Wright 2000).
    /// </summary>
    /// <exception cref="ArgumentOutOfRangeException">confidence is not between 0 and 1.</exception>
    /// <exception cref="ArgumentException">Columns differ in length, or a value is infinite.</exception>
    public static IReadOnlyList<Correlation> Spearman(IReadOnlyList<NumberColumn> columns, ReadOnlySpan<int> rows, double confidence) =>
        Pairs(columns, rows, confidence, ranks: true);

    private static List<Correlation> Pairs(IReadOnlyList<NumberColumn> columns, ReadOnlySpan<int> rows, double confidence, bool ranks)
    {
        var z = Normal.UpperQuantile(ConfidenceLevel.UpperTail(confidence));
        var chosen = columns.Select(_ => (ChosenValues?)null).ToArray();
        for (var i = 0; i < columns.Count; i++)
        {
            if (columns[i].Rows != columns[0].Rows)
            {
                throw new ArgumentException($"Column '{columns[i].Name}' has {columns[i].Rows} rows where '{columns[0].Name}' has {columns[0].Rows}.", nameof(columns));
            }

            chosen[i] = ChosenValues.Of(columns[i], rows, ranks);
        }

        var results = new List<Correlation>();
        for (var i = 0; i < columns.Count; i++)
        {
            for (var j = i + 1; j < columns.Count; j++)
            {
                var both = chosen[i]!.Together(chosen[j]!);
                var pair = CorrelationFigures.Of(both.First, both.Second, z, ranks);
                results.Add(new Correlation(columns[i].Name, columns[j].Name, both.First.Count, pair.R, pair.Lower, pair.Upper, pair.P));
            }
        }

        return results;
    }
}
