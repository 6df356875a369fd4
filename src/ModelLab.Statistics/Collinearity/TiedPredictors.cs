using ModelLab.Statistics.Description;

namespace ModelLab.Statistics.Collinearity;

/// <summary>Variables tied by chains of strong correlations.</summary>
/// <param name="Variables">Their names, in the order of the columns.</param>
/// <param name="Pairs">The pairs at or above the threshold, strongest first.</param>
public sealed record TiedSet(IReadOnlyList<string> Variables, IReadOnlyList<Correlation> Pairs);

/// <summary>Finds sets of predictors that carry much the same information.</summary>
public static class TiedPredictors
{
    /// <summary>|r| at or above which a pair is marked (common practice).</summary>
    public const double Threshold = 0.7;

    /// <summary>
    /// Connected sets of variables with |r| ≥ <paramref name="threshold"/>; one set each, in the order of their first variable.
    /// Two variables of a set may be weakly correlated themselves where others lie between them.
    /// </summary>
    /// <param name="correlations">All pairs in the order of the columns, as <see cref="Correlations.Pearson"/> gives them; undefined ones tie nothing.</param>
    /// <param name="threshold">Above 0, at most 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">The threshold is not above 0 and at most 1.</exception>
    public static IReadOnlyList<TiedSet> Find(IReadOnlyList<Correlation> correlations, double threshold = Threshold)
    {
        if (!(threshold > 0 && threshold <= 1))
        {
            throw new ArgumentOutOfRangeException(nameof(threshold), threshold, "The threshold of |r| lies above 0 and is at most 1.");
        }

        var variables = correlations.SelectMany(c => new[] { c.First, c.Second }).Distinct(StringComparer.Ordinal).ToList();
        // every variable points to the earliest one it is known to be tied to
        var earliest = variables.ToDictionary(name => name, name => name, StringComparer.Ordinal);
        var place = variables.Select((name, at) => KeyValuePair.Create(name, at)).ToDictionary(StringComparer.Ordinal);
        var strong = correlations.Where(c => Math.Abs(c.R ?? 0) >= threshold).ToList();
        foreach (var pair in strong)
        {
            var first = Root(earliest, pair.First);
            var second = Root(earliest, pair.Second);
            if (place[first] > place[second])
            {
                (first, second) = (second, first);
            }

            earliest[second] = first;
        }

        return
        [
            .. variables.GroupBy(name => Root(earliest, name), StringComparer.Ordinal)
                .Where(set => set.Count() > 1)
                .Select(set => new TiedSet(
                    [.. set],
                    [.. strong.Where(pair => Root(earliest, pair.First) == set.Key).OrderByDescending(pair => Math.Abs(pair.R ?? 0))])),
        ];
    }

    private static string Root(Dictionary<string, string> earliest, string name)
    {
        while (!string.Equals(earliest[name], name, StringComparison.Ordinal))
        {
            name = earliest[name];
        }

        return name;
    }
}
