namespace ModelLab.Statistics.Catalogue;

/// <summary>Statistics of variables before modelling.</summary>
internal static class DescriptionStatistics
{
    /// <summary>The entries in the order in which they are shown.</summary>
    public static IReadOnlyList<Statistic> All { get; } =
    [
        new(StatisticSubject.Number, "n", "Values present", "n", "Rows in which the variable is not missing.", "common practice"),
        new(StatisticSubject.Number, "missing", "Values missing", "", "Rows in which the variable is missing.", "common practice"),
        new(StatisticSubject.Number, "distinct", "Distinct values", "", "Different values among those present, compared as written.", "common practice"),
        new(StatisticSubject.Number, "mean", "Mean", "x̄", "Σx/n.", "common practice"),
        new(StatisticSubject.Number, "standardDeviation", "Standard deviation", "SD", "√(Σ(x − mean)²/(n − 1)).", "common practice"),
        new(StatisticSubject.Number, "minimum", "Minimum", "", "The smallest value.", "common practice"),
        new(StatisticSubject.Number, "lowerQuartile", "Lower quartile", "Q₁", "Quantile at ¼: linear between neighbours at (n − 1)/4 above the smallest value.", "Hyndman and Fan 1996, definition 7"),
        new(StatisticSubject.Number, "median", "Median", "Q₂", "Quantile at ½.", "Hyndman and Fan 1996, definition 7"),
        new(StatisticSubject.Number, "upperQuartile", "Upper quartile", "Q₃", "Quantile at ¾.", "Hyndman and Fan 1996, definition 7"),
        new(StatisticSubject.Number, "maximum", "Maximum", "", "The largest value.", "common practice"),
        new(StatisticSubject.Number, "skewness", "Skewness", "G₁", "√(n(n − 1))/(n − 2) · m₃/m₂^1.5, m the moments about the mean divided by n.", "Joanes and Gill 1998"),
        new(StatisticSubject.Number, "excessKurtosis", "Excess kurtosis", "G₂", "(n − 1)/((n − 2)(n − 3)) · ((n + 1)(m₄/m₂² − 3) + 6); 0 is expected of normal values.", "Joanes and Gill 1998"),
        new(StatisticSubject.Category, "n", "Rows with a category", "n", "Rows in which the variable is not missing.", "common practice"),
        new(StatisticSubject.Category, "missing", "Rows without a category", "", "Rows in which the variable is missing.", "common practice"),
        new(StatisticSubject.Category, "count", "Rows of a category", "", "Rows that hold the category.", "common practice"),
        new(StatisticSubject.Correlation, "n", "Rows present in both", "n", "Rows in which neither variable is missing.", "common practice"),
        new(StatisticSubject.Correlation, "r", "Correlation", "r", "Σ(x − x̄)(y − ȳ)/√(Σ(x − x̄)²Σ(y − ȳ)²); of the ranks for Spearman's.", "Pearson 1896; Spearman 1904"),
        new(StatisticSubject.Correlation, "lower", "Lower end of the confidence interval", "", "tanh(artanh r − z/√(n − 3)); for ranks z√((1 + r²/2)/(n − 3)).", "Fisher 1921; Bonett and Wright 2000"),
        new(StatisticSubject.Correlation, "upper", "Upper end of the confidence interval", "", "tanh(artanh r + z/√(n − 3)); for ranks z√((1 + r²/2)/(n − 3)).", "Fisher 1921; Bonett and Wright 2000"),
        new(StatisticSubject.Correlation, "p", "p of the correlation", "p", "Two-sided tail of t = r√((n − 2)/(1 − r²)) on n − 2 degrees of freedom.", "Fisher 1915"),
    ];
}
