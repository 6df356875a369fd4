namespace ModelLab.Statistics.Catalogue;

/// <summary>Statistics of the whole model and of its analysis-of-variance table.</summary>
internal static class FitStatistics
{
    /// <summary>The entries in the order in which they are shown.</summary>
    public static IReadOnlyList<Statistic> All { get; } =
    [
        new(StatisticSubject.Fit, "n", "Rows analysed", "n", "Rows complete on all variables of the model and chosen for it.", "common practice"),
        new(StatisticSubject.Fit, "s", "Residual standard deviation", "s", "√(RSS/(n − p)), in units of the outcome; 0 at an exact fit.", "common practice"),
        new(StatisticSubject.Fit, "dfResidual", "Residual degrees of freedom", "n − p", "Rows analysed less estimated coefficients.", "common practice"),
        new(StatisticSubject.Fit, "rSquared", "Explained share of variance", "R²", "1 − RSS/SST; about zero without intercept.", "common practice"),
        new(StatisticSubject.Fit, "adjustedRSquared", "Adjusted explained share", "R²adj", "1 − (RSS/(n − p))/(SST/(n − 1)); n in place of n − 1 without intercept.", "Ezekiel 1930"),
        new(StatisticSubject.Fit, "predictedRSquared", "Predicted explained share", "R²pred", "1 − PRESS/SST.", "Allen 1974"),
        new(StatisticSubject.Fit, "f", "Overall F", "F", "(Explained sum of squares/its degrees of freedom)/s², all terms against none.", "common practice"),
        new(StatisticSubject.Fit, "dfModel", "Degrees of freedom of the model", "", "Columns of the design, the intercept not counted.", "common practice"),
        new(StatisticSubject.Fit, "p", "p of the overall F", "p", "Upper tail of F on the degrees of freedom of model and residuals.", "common practice"),
        new(StatisticSubject.Fit, "ssModel", "Explained sum of squares", "SSR", "SST − RSS.", "common practice"),
        new(StatisticSubject.Fit, "ssResidual", "Residual sum of squares", "RSS", "Σe², e = y − ŷ.", "common practice"),
        new(StatisticSubject.Fit, "ssTotal", "Total sum of squares", "SST", "Σ(y − mean of y)²; Σy² without intercept.", "common practice"),
        new(StatisticSubject.Fit, "press", "Predicted residual sum of squares", "PRESS", "Σ(e/(1 − h))²: each row predicted from the others.", "Allen 1974"),
        new(StatisticSubject.Fit, "logLikelihood", "Log-likelihood", "ln L", "Gaussian, at the maximum-likelihood variance RSS/n: −(n/2)(ln 2π + ln(RSS/n) + 1).", "common practice"),
        new(StatisticSubject.Fit, "aic", "Akaike information criterion", "AIC", "−2 ln L + 2(p + 1); σ² counts as a parameter.", "Akaike 1974"),
        new(StatisticSubject.Fit, "aicc", "Akaike criterion for small samples", "AICc", "AIC + 2(p + 1)(p + 2)/(n − p − 2).", "Hurvich and Tsai 1989"),
        new(StatisticSubject.Fit, "bic", "Bayesian information criterion", "BIC", "−2 ln L + (p + 1) ln n; σ² counts as a parameter.", "Schwarz 1978"),
        new(StatisticSubject.Fit, "cp", "Mallows' Cp", "Cp", "RSS/s² of the full model − n + 2p.", "Mallows 1973"),
        new(StatisticSubject.Fit, "r", "Multiple correlation", "R", "√R²: correlation of outcome and fitted values.", "common practice"),
        new(StatisticSubject.Variance, "df", "Degrees of freedom", "df", "Of the model: columns without intercept; of the residuals: n − p; in total: their sum.", "common practice"),
        new(StatisticSubject.Variance, "sumOfSquares", "Sum of squares", "SS", "Explained, left over, or in total about the mean (about zero without intercept).", "common practice"),
        new(StatisticSubject.Variance, "meanSquare", "Mean square", "MS", "Sum of squares/degrees of freedom.", "common practice"),
        new(StatisticSubject.Variance, "f", "F", "F", "Mean square of the model/mean square of the residuals.", "Fisher 1925"),
        new(StatisticSubject.Variance, "p", "p of F", "p", "Upper tail of F on the two degrees of freedom.", "Fisher 1925"),
    ];
}
