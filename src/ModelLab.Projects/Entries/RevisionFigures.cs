namespace ModelLab.Projects.Entries;

/// <summary>One coefficient of a revision. The category is an index; its name lies in the sealed part of the dataset's or preparation's entry.</summary>
public sealed record RevisionCoefficient(
    string Term, int? Category, double Estimate, double? Lower, double? Upper, double? P, double? StandardError, double? T,
    double? Standardized, double? PartialR, double? SemiPartialR, double? Vif);

/// <summary>
/// The test of one term of a revision given all others. The reference is the index of the category against which its coefficients are
/// read; null for a number. It is the dictionary's where that has rows among those analysed, else the first that has.
/// </summary>
public sealed record RevisionTerm(
    string Term, int Df, double SumOfSquares, double? F, double? P, double? PartialRSquared, double? Vif, bool Removable, int? Reference = null);

/// <summary>What a revision would be without one removable term.</summary>
public sealed record RevisionLoss(
    string Term, int Df, double? F, double? P, double SumOfSquares, double RSquaredLoss,
    double? AdjustedRSquaredChange, double? AicChange, double? AiccChange, double? BicChange);

/// <summary>The figures of the whole model; definitions in the statistics catalogue.</summary>
public sealed record RevisionFit(
    int N, double S, int DfResidual, double RSquared, double? AdjustedRSquared, double? PredictedRSquared, double? F, int DfModel, double? P,
    double SsModel, double SsResidual, double SsTotal, double? Press, double? LogLikelihood, double? Aic, double? Aicc, double? Bic, double? Cp,
    double R, bool ExactFit);

/// <summary>Two predictors of a revision that carry much the same information.</summary>
public sealed record TiedPair(string First, string Second, double R);

/// <summary>A set of tied predictors.</summary>
public sealed record TiedVariables(IReadOnlyList<string> Variables, IReadOnlyList<TiedPair> Pairs);

/// <summary>What was computed at a revision.</summary>
public sealed record RevisionFigures(
    IReadOnlyList<RevisionCoefficient> Coefficients, IReadOnlyList<RevisionTerm> Terms, IReadOnlyList<RevisionLoss> Losses,
    RevisionFit Fit, IReadOnlyList<TiedVariables> Tied);
