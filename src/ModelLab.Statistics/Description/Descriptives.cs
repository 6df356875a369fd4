using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Description;

/// <summary>Figures of one numeric variable; null where undefined (too few values, no spread).</summary>
/// <param name="N">Values present.</param>
/// <param name="Missing">Values missing.</param>
/// <param name="Distinct">Different values among those present, compared as written.</param>
/// <param name="Mean">Σx/n.</param>
/// <param name="StandardDeviation">√(Σ(x − mean)²/(n − 1)).</param>
/// <param name="Minimum">The smallest value.</param>
/// <param name="LowerQuartile">Quantile at ¼, definition 7 of Hyndman and Fan (1996).</param>
/// <param name="Median">Quantile at ½.</param>
/// <param name="UpperQuartile">Quantile at ¾.</param>
/// <param name="Maximum">The largest value.</param>
/// <param name="Skewness">Adjusted skewness G₁.</param>
/// <param name="ExcessKurtosis">Adjusted excess kurtosis G₂.</param>
public sealed record NumberDescription(
    int N, int Missing, int Distinct, double? Mean, double? StandardDeviation, double? Minimum, double? LowerQuartile,
    double? Median, double? UpperQuartile, double? Maximum, double? Skewness, double? ExcessKurtosis);

/// <summary>Count of one category.</summary>
/// <param name="Index">Index of the category in its column.</param>
/// <param name="Category">Its name.</param>
/// <param name="Count">Rows in it.</param>
public sealed record CategoryCount(int Index, string Category, int Count);

/// <summary>Figures of one categorical variable.</summary>
/// <param name="N">Rows with a category.</param>
/// <param name="Missing">Rows without.</param>
/// <param name="Categories">All categories in their order, those without a row too.</param>
public sealed record CategoryDescription(int N, int Missing, IReadOnlyList<CategoryCount> Categories);

/// <summary>Description before modelling.</summary>
public static class Descriptives
{
    /// <summary>Describes a numeric variable over all rows of its column.</summary>
    /// <exception cref="ArgumentException">A value is infinite; the message names the row.</exception>
    public static NumberDescription Describe(NumberColumn column)
    {
        var present = PresentValues.Of(column);
        var sorted = present.Sorted();
        var moments = Moments.Of(present);
        return new NumberDescription(
            present.Count,
            column.Rows - present.Count,
            DistinctValues.OfSorted(sorted),
            Description.Mean.Of(moments),
            Description.StandardDeviation.Of(moments),
            Quantiles.OfSorted(sorted, 0),
            Quantiles.OfSorted(sorted, 0.25),
            Quantiles.OfSorted(sorted, 0.5),
            Quantiles.OfSorted(sorted, 0.75),
            Quantiles.OfSorted(sorted, 1),
            Description.Skewness.Of(moments),
            Description.ExcessKurtosis.Of(moments));
    }

    /// <summary>Describes a categorical variable.</summary>
    /// <exception cref="ArgumentException">A row holds a code beyond the categories; the message names it.</exception>
    public static CategoryDescription Describe(CategoryColumn column)
    {
        var counts = new int[column.Categories.Count];
        var codes = column.Codes;
        var present = 0;
        for (var row = 0; row < codes.Length; row++)
        {
            if (codes[row] < 0)
            {
                continue;
            }

            if (codes[row] >= counts.Length)
            {
                throw new ArgumentException($"Column '{column.Name}' holds category {codes[row]} in row {row + 1}, but has {counts.Length} categories.", nameof(column));
            }

            counts[codes[row]]++;
            present++;
        }

        return new CategoryDescription(
            present,
            column.Rows - present,
            [.. counts.Select((count, index) => new CategoryCount(index, column.Categories[index], count))]);
    }
}
