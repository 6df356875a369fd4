using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Inference;

/// <summary>One coefficient. What does not exist (all inference at an exact fit, a standardised value of a 0/1 column) is null.</summary>
/// <param name="Term">The term; null for the intercept.</param>
/// <param name="CategoryIndex">Index of the category, for a 0/1 column.</param>
/// <param name="Category">Name of the category, for a 0/1 column.</param>
/// <param name="Estimate">b, in units of outcome per unit of the column.</param>
/// <param name="Lower">Lower end of the confidence interval.</param>
/// <param name="Upper">Upper end of the confidence interval.</param>
/// <param name="P">Two-sided p of t on n − p degrees of freedom.</param>
/// <param name="StandardError">s·√(X'X)⁻¹ⱼⱼ.</param>
/// <param name="T">b / standard error.</param>
/// <param name="Standardized">b·SD(x)/SD(y), sample SDs; for a variable with powers the coefficients of the same polynomial in the standardised variable. Null for the intercept, 0/1 columns of a category, powers without all lower ones, and models without intercept.</param>
/// <param name="PartialR">t/√(t² + df), sign of t; single-column terms.</param>
/// <param name="SemiPartialR">t·√((1 − R²)/df); single-column terms.</param>
/// <param name="Vif">1/(1 − R²ⱼ) of the column on all others; null for the intercept and without intercept.</param>
public sealed record CoefficientResult(
    Term? Term, int? CategoryIndex, string? Category,
    double Estimate, double? Lower, double? Upper, double? P, double? StandardError, double? T,
    double? Standardized, double? PartialR, double? SemiPartialR, double? Vif);

/// <summary>The test of one term given all others (partial F).</summary>
/// <param name="Term">The term.</param>
/// <param name="Df">Its columns.</param>
/// <param name="SumOfSquares">What its removal adds to the residual sum of squares.</param>
/// <param name="F">Partial F on (Df, n − p).</param>
/// <param name="P">Upper tail of F.</param>
/// <param name="PartialRSquared">SS/(SS + RSS).</param>
/// <param name="Vif">VIF, generalised where the term has several columns (Fox and Monette 1992); null without intercept.</param>
/// <param name="Removable">Neither held in nor needed by a higher-order term of the model (marginality), nor all that a model without intercept has.</param>
public sealed record TermResult(Term Term, int Df, double SumOfSquares, double? F, double? P, double? PartialRSquared, double? Vif, bool Removable);

/// <summary>What the model would be without one removable term, on the same rows.</summary>
/// <param name="Term">The term.</param>
/// <param name="Df">Its columns.</param>
/// <param name="F">Partial F.</param>
/// <param name="P">Its p.</param>
/// <param name="SumOfSquares">Rise of the residual sum of squares.</param>
/// <param name="RSquaredLoss">R² now − R² without.</param>
/// <param name="AdjustedRSquaredChange">Adjusted R² without − now.</param>
/// <param name="AicChange">AIC without − now.</param>
/// <param name="AiccChange">AICc without − now.</param>
/// <param name="BicChange">BIC without − now.</param>
public sealed record TermLoss(
    Term Term, int Df, double? F, double? P, double SumOfSquares, double RSquaredLoss,
    double? AdjustedRSquaredChange, double? AicChange, double? AiccChange, double? BicChange);

/// <summary>The figures of the whole model. All information criteria count σ² as a parameter. Null where undefined (exact fit, too few rows for AICc).</summary>
/// <param name="N">Rows analysed.</param>
/// <param name="S">Residual standard deviation √(RSS/(n − p)); 0 at an exact fit.</param>
/// <param name="DfResidual">n − p.</param>
/// <param name="RSquared">1 − RSS/SST; about zero without intercept.</param>
/// <param name="AdjustedRSquared">1 − (RSS/(n − p))/(SST/(n − 1)); n in place of n − 1 without intercept.</param>
/// <param name="PredictedRSquared">1 − PRESS/SST.</param>
/// <param name="F">Overall F on (DfModel, DfResidual); null without predictors.</param>
/// <param name="DfModel">Columns, the intercept not counted.</param>
/// <param name="P">Upper tail of F.</param>
/// <param name="SsModel">Sum of squares explained.</param>
/// <param name="SsResidual">RSS.</param>
/// <param name="SsTotal">SST, about the mean, about zero without intercept.</param>
/// <param name="Press">Σ (e/(1 − h))²; null where a leverage is 1.</param>
/// <param name="LogLikelihood">Gaussian, at the maximum-likelihood variance RSS/n.</param>
/// <param name="Aic">−2LL + 2(p + 1).</param>
/// <param name="Aicc">AIC + 2(p + 1)(p + 2)/(n − p − 2).</param>
/// <param name="Bic">−2LL + (p + 1) ln n.</param>
/// <param name="Cp">RSS/s²(full) − n + 2p; null where no full model was given.</param>
/// <param name="R">Multiple correlation √R².</param>
/// <param name="ExactFit">RSS lies below the rounding bound of the arithmetic.</param>
public sealed record FitSummary(
    int N, double S, int DfResidual, double RSquared, double? AdjustedRSquared, double? PredictedRSquared,
    double? F, int DfModel, double? P, double SsModel, double SsResidual, double SsTotal, double? Press,
    double? LogLikelihood, double? Aic, double? Aicc, double? Bic, double? Cp, double R, bool ExactFit);

/// <summary>A line of the analysis-of-variance table.</summary>
public enum VarianceSource
{
    /// <summary>Explained by the model.</summary>
    Model,

    /// <summary>Left over.</summary>
    Residual,

    /// <summary>About the mean (about zero without intercept).</summary>
    Total,
}

/// <summary>One line of the analysis-of-variance table.</summary>
public sealed record VarianceLine(VarianceSource Source, int Df, double SumOfSquares, double? MeanSquare, double? F, double? P);

/// <summary>Everything reported of one fit.</summary>
public sealed record ModelResults(
    FitSummary Fit,
    IReadOnlyList<CoefficientResult> Coefficients,
    IReadOnlyList<TermResult> Terms,
    IReadOnlyList<TermLoss> Losses,
    IReadOnlyList<VarianceLine> Variance);
