namespace ModelLab.Statistics.Tests.LeastSquares;

/// <summary>Right digits of many figures, gathered by quantity; the least of each counts.</summary>
public sealed class DigitsTable
{
    private readonly SortedDictionary<string, double> least = new(StringComparer.Ordinal);

    public double Least => least.Values.Min();

    public int Quantities => least.Count;

    public void Add(string quantity, double? value, string expected)
    {
        var digits = value is { } number ? LogRelativeError.Of(number, expected) : 0.0;
        least[quantity] = least.TryGetValue(quantity, out var before) ? Math.Min(before, digits) : digits;
    }

    public double Of(string quantity) => least[quantity];

    public override string ToString() => string.Join(", ", least.Select(entry => FormattableString.Invariant($"{entry.Key} {entry.Value:F1}")));
}
