using System.Globalization;
using ModelLab.Projects.Entries;
using ModelLab.Statistics.Collinearity;

namespace ModelLab.Projects.Findings;

/// <summary>Predictors that carry much the same information: one finding a set.</summary>
public sealed class TiedPredictorsRule : IFindingRule
{
    private const int MostPairsNamed = 10;

    /// <inheritdoc/>
    public string Name => "tied-predictors";

    /// <inheritdoc/>
    public int Version => 1;

    /// <inheritdoc/>
    public string Source => "|r| ≥ 0.7, common practice";

    /// <inheritdoc/>
    public IEnumerable<FindingRecord> Look(RevisionEvidence evidence) =>
        evidence.Figures.Tied.Select(set => new FindingRecord(
            Name,
            Version,
            new Place("revision", evidence.RevisionId, null),
            FindingWeight.Note,
            set.Variables,
            $"{Join(set.Variables)} are tied on the rows analysed: {Pairs(set.Pairs)} "
            + string.Create(CultureInfo.InvariantCulture, $"(marked from |r| {TiedPredictors.Threshold:0.0}, common practice)."),
            "The model can hardly tell their effects apart: intervals widen, and leaving one out moves the others. Decide by subject matter which one answers the question, or combine them; do not let a small difference in p decide."));

    private static string Pairs(IReadOnlyList<TiedPair> pairs) =>
        string.Join(", ", pairs.Take(MostPairsNamed).Select(p => string.Create(CultureInfo.InvariantCulture, $"r {p.R:0.00} between {p.First} and {p.Second}")))
        + (pairs.Count > MostPairsNamed ? string.Create(CultureInfo.InvariantCulture, $" and {pairs.Count - MostPairsNamed} weaker pairs") : string.Empty);

    private static string Join(IReadOnlyList<string> names) => string.Join(", ", names.Take(names.Count - 1)) + " and " + names[^1];
}
