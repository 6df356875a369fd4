using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Description;

/// <summary>Pearson correlation of two variables on the rows given.</summary>
/// <param name="First">Name of the first variable.</param>
/// <param name="Second">Name of the second variable.</param>
/// <param name="N">Rows in which neither is missing.</param>
/// <param name="R">The correlation; null where one has no spread or n &lt; 2.</param>
/// <param name="Lower">Fisher interval, lower end; null for n &lt; 4 or |r| = 1.</param>
/// <param name="Upper">Fisher interval, upper end.</param>
/// <param name="P">Two-sided p of t = r√((n − 2)/(1 − r²)).</param>
public sealed record Correlation(string First, string Second, int N, double? R, double? Lower, double? Upper, double? P);

/// <summary>Correlations of numeric variables, pair by pair.</summary>
public static class Correlations
{
    /// <summary>All pairs i &lt; j in order, each on the rows (zero-based; all rows where empty) in which neither is missing.</summary>
    public static IReadOnlyList<Correlation> Pearson(IReadOnlyList<NumberColumn> columns, ReadOnlySpan<int> rows, double confidence) => throw new NotImplementedException();
}
