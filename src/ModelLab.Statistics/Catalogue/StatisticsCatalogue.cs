namespace ModelLab.Statistics.Catalogue;

/// <summary>
/// Every statistic that the program reports, with its name, symbol, definition and source said once. n: rows analysed;
/// p: estimated coefficients, intercept included; RSS and SST: residual and total sum of squares; h: leverage.
/// </summary>
public static class StatisticsCatalogue
{
    private static readonly Dictionary<(StatisticSubject Subject, string Key), Statistic> ByKey;

    static StatisticsCatalogue()
    {
        All = [.. FitStatistics.All, .. CoefficientStatistics.All, .. TermStatistics.All, .. RowStatistics.All, .. DescriptionStatistics.All];
        ByKey = All.ToDictionary(statistic => (statistic.Subject, statistic.Key));
    }

    /// <summary>All entries, by subject, in the order in which they are shown.</summary>
    public static IReadOnlyList<Statistic> All { get; }

    /// <summary>The entry of a key, or null.</summary>
    public static Statistic? Find(StatisticSubject subject, string key) => ByKey.GetValueOrDefault((subject, key));
}
