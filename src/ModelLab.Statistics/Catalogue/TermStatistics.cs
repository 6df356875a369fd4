namespace ModelLab.Statistics.Catalogue;

/// <summary>Statistics of one term given all others, and of the model without it.</summary>
internal static class TermStatistics
{
    /// <summary>The entries in the order in which they are shown.</summary>
    public static IReadOnlyList<Statistic> All { get; } =
    [
        new(StatisticSubject.Term, "df", "Degrees of freedom of the term", "df", "Its columns.", "common practice"),
        new(StatisticSubject.Term, "sumOfSquares", "Sum of squares of the term", "SS", "What its removal adds to RSS.", "common practice"),
        new(StatisticSubject.Term, "f", "Partial F", "F", "(Sum of squares of the term/its degrees of freedom)/s².", "common practice"),
        new(StatisticSubject.Term, "p", "p of the partial F", "p", "Upper tail of F on the degrees of freedom of term and residuals.", "common practice"),
        new(StatisticSubject.Term, "partialRSquared", "Partial explained share", "", "SS/(SS + RSS).", "common practice"),
        new(StatisticSubject.Term, "vif", "Variance inflation factor of the term", "GVIF", "det R₁₁·det R₂₂/det R of the correlations of its columns, of the others, of all; VIF for one column.", "Fox and Monette 1992"),
        new(StatisticSubject.Loss, "df", "Degrees of freedom of the term", "df", "Its columns.", "common practice"),
        new(StatisticSubject.Loss, "f", "Partial F", "F", "(Rise of RSS/degrees of freedom of the term)/s².", "common practice"),
        new(StatisticSubject.Loss, "p", "p of the partial F", "p", "Upper tail of F on the degrees of freedom of term and residuals.", "common practice"),
        new(StatisticSubject.Loss, "sumOfSquares", "Rise of the residual sum of squares", "SS", "RSS without the term − RSS.", "common practice"),
        new(StatisticSubject.Loss, "rSquaredLoss", "Loss of explained share", "", "R² now − R² without the term.", "common practice"),
        new(StatisticSubject.Loss, "adjustedRSquaredChange", "Change of the adjusted explained share", "", "Adjusted R² without the term − now.", "common practice"),
        new(StatisticSubject.Loss, "aicChange", "Change of AIC", "ΔAIC", "AIC without the term − now; below 0 the smaller model is preferred.", "Akaike 1974"),
        new(StatisticSubject.Loss, "aiccChange", "Change of AICc", "ΔAICc", "AICc without the term − now.", "Hurvich and Tsai 1989"),
        new(StatisticSubject.Loss, "bicChange", "Change of BIC", "ΔBIC", "BIC without the term − now.", "Schwarz 1978"),
    ];
}
