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

    /// <summary>Connected sets of variables with |r| ≥ <paramref name="threshold"/>; one set each, in the order of their first variable.</summary>
    public static IReadOnlyList<TiedSet> Find(IReadOnlyList<Correlation> correlations, double threshold = Threshold) => throw new NotImplementedException();
}
