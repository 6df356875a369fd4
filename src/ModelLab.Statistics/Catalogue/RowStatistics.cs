namespace ModelLab.Statistics.Catalogue;

/// <summary>Statistics of one row analysed.</summary>
internal static class RowStatistics
{
    /// <summary>The entries in the order in which they are shown.</summary>
    public static IReadOnlyList<Statistic> All { get; } =
    [
        new(StatisticSubject.Row, "fitted", "Fitted value", "ŷ", "Xb of the row, in units of the outcome.", "common practice"),
        new(StatisticSubject.Row, "residual", "Residual", "e", "y − ŷ.", "common practice"),
        new(StatisticSubject.Row, "leverage", "Leverage", "h", "Diagonal element of X(X′X)⁻¹X′; their sum is p.", "Hoaglin and Welsch 1978"),
        new(StatisticSubject.Row, "studentizedInternal", "Internally studentised residual", "r", "e/(s√(1 − h)).", "Cook and Weisberg 1982"),
        new(StatisticSubject.Row, "studentizedExternal", "Externally studentised residual", "t", "e/(s₍ᵢ₎√(1 − h)), s₍ᵢ₎ of the fit without the row.", "Belsley, Kuh and Welsch 1980"),
        new(StatisticSubject.Row, "cooksDistance", "Cook's distance", "D", "r²h/(p(1 − h)), r internally studentised.", "Cook 1977"),
    ];
}
