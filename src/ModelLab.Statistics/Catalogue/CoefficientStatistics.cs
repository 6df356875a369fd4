namespace ModelLab.Statistics.Catalogue;

/// <summary>Statistics of one coefficient.</summary>
internal static class CoefficientStatistics
{
    /// <summary>The entries in the order in which they are shown.</summary>
    public static IReadOnlyList<Statistic> All { get; } =
    [
        new(StatisticSubject.Coefficient, "estimate", "Coefficient", "b", "Least-squares estimate, in units of the outcome per unit of the column, the other columns held fixed.", "common practice"),
        new(StatisticSubject.Coefficient, "lower", "Lower end of the confidence interval", "", "b − t·SE, t the quantile of Student's t on n − p degrees of freedom.", "common practice"),
        new(StatisticSubject.Coefficient, "upper", "Upper end of the confidence interval", "", "b + t·SE, t the quantile of Student's t on n − p degrees of freedom.", "common practice"),
        new(StatisticSubject.Coefficient, "p", "p of the coefficient", "p", "Two-sided tail of Student's t on n − p degrees of freedom.", "Student 1908; Fisher 1925"),
        new(StatisticSubject.Coefficient, "standardError", "Standard error", "SE", "s·√((X′X)⁻¹ⱼⱼ).", "common practice"),
        new(StatisticSubject.Coefficient, "t", "t of the coefficient", "t", "b/SE.", "Fisher 1925"),
        new(StatisticSubject.Coefficient, "standardized", "Standardised coefficient", "β", "b·SD(x)/SD(y) with sample standard deviations; none for the 0/1 columns of a category.", "common practice"),
        new(StatisticSubject.Coefficient, "partialR", "Partial correlation", "", "t/√(t² + n − p), with the sign of t.", "common practice"),
        new(StatisticSubject.Coefficient, "semiPartialR", "Semi-partial correlation", "", "t·√((1 − R²)/(n − p)).", "common practice"),
        new(StatisticSubject.Coefficient, "vif", "Variance inflation factor", "VIF", "1/(1 − R²ⱼ), R²ⱼ of the column on all others.", "Marquardt 1970"),
    ];
}
