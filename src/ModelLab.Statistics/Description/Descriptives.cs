using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Description;

/// <summary>Figures of one numeric variable; null where undefined (too few values, no spread).</summary>
public sealed record NumberDescription(
    int N, int Missing, int Distinct, double? Mean, double? StandardDeviation, double? Minimum, double? LowerQuartile,
    double? Median, double? UpperQuartile, double? Maximum, double? Skewness, double? ExcessKurtosis);

/// <summary>Count of one category.</summary>
public sealed record CategoryCount(int Index, string Category, int Count);

/// <summary>Figures of one categorical variable.</summary>
public sealed record CategoryDescription(int N, int Missing, IReadOnlyList<CategoryCount> Categories);

/// <summary>Description before modelling.</summary>
public static class Descriptives
{
    /// <summary>Describes a numeric variable over all rows of its column.</summary>
    public static NumberDescription Describe(NumberColumn column) => throw new NotImplementedException();

    /// <summary>Describes a categorical variable.</summary>
    public static CategoryDescription Describe(CategoryColumn column) => throw new NotImplementedException();
}
