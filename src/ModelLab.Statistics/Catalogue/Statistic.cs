namespace ModelLab.Statistics.Catalogue;

/// <summary>What a statistic describes; its key is unique among those of one subject.</summary>
public enum StatisticSubject
{
    /// <summary>One coefficient of a fit.</summary>
    Coefficient,

    /// <summary>One term given all others.</summary>
    Term,

    /// <summary>The model without one removable term.</summary>
    Loss,

    /// <summary>The whole model.</summary>
    Fit,

    /// <summary>One line of the analysis-of-variance table.</summary>
    Variance,

    /// <summary>One row analysed.</summary>
    Row,

    /// <summary>One numeric variable.</summary>
    Number,

    /// <summary>One categorical variable.</summary>
    Category,

    /// <summary>Two numeric variables.</summary>
    Correlation,
}

/// <summary>What is said of a statistic wherever it appears.</summary>
/// <param name="Subject">What it describes.</param>
/// <param name="Key">Its name in the HTTP API and in stored figures, camelCase.</param>
/// <param name="Name">Its name on pages and in reports.</param>
/// <param name="Symbol">Its symbol; empty where the trade has none.</param>
/// <param name="Definition">One line: how it is formed, what its letters count.</param>
/// <param name="Source">Where the definition comes from, or "common practice".</param>
public sealed record Statistic(StatisticSubject Subject, string Key, string Name, string Symbol, string Definition, string Source);
