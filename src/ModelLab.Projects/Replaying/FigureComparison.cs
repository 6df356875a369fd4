using System.Text.Json;
using System.Text.Json.Nodes;
using ModelLab.Projects.Entries;

namespace ModelLab.Projects.Replaying;

/// <summary>The figures of a revision that a replay compares.</summary>
public sealed record ComparedFigures(RevisionFigures Figures, double? FullModelMeanSquare);

/// <summary>Compares what is recorded with what is computed again, figure by figure.</summary>
public static class FigureComparison
{
    /// <summary>
    /// The largest |a − b| / max(|a|, |b|) over all numbers, 0 where all bits agree; null where names, texts, counts or missing values differ.
    /// Comparing the written form compares every figure, those of later versions too.
    /// </summary>
    /// <param name="recorded">What is recorded.</param>
    /// <param name="again">What is computed now.</param>
    /// <param name="laterFigures">Whether what is computed now may hold figures that were not yet computed when the other was recorded.</param>
    public static double? LargestRelativeDifference<T>(T recorded, T again, bool laterFigures = false) =>
        Compare(JsonSerializer.SerializeToNode(recorded, ProjectJson.Options), JsonSerializer.SerializeToNode(again, ProjectJson.Options), laterFigures);

    private static double? Compare(JsonNode? a, JsonNode? b, bool laterFigures)
    {
        switch (a, b)
        {
            case (null, null):
                return 0;
            case (JsonObject x, JsonObject y) when x.Count == y.Count || (laterFigures && x.Count < y.Count):
                return Largest(x.Select(m => y.TryGetPropertyValue(m.Key, out var other) ? Compare(m.Value, other, laterFigures) : null));
            case (JsonArray x, JsonArray y) when x.Count == y.Count:
                return Largest(x.Zip(y, (p, q) => Compare(p, q, laterFigures)));
            case (JsonValue x, JsonValue y) when x.GetValueKind() == JsonValueKind.Number && y.GetValueKind() == JsonValueKind.Number:
                return Relative(x.GetValue<double>(), y.GetValue<double>());
            case (JsonValue x, JsonValue y):
                return x.ToJsonString() == y.ToJsonString() ? 0 : null;
            default:
                return null;
        }
    }

    private static double? Largest(IEnumerable<double?> differences)
    {
        double? largest = 0;
        foreach (var difference in differences)
        {
            if (difference is null)
            {
                return null;
            }

            largest = Math.Max(largest.Value, difference.Value);
        }

        return largest;
    }

    private static double Relative(double a, double b) => a == b ? 0 : Math.Abs(a - b) / Math.Max(Math.Abs(a), Math.Abs(b));
}
