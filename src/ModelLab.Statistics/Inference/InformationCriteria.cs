using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// Log-likelihood of the normal linear model at its maximum and the criteria built on it. Parameters are k = p + 1: the coefficients
/// and σ².
/// </summary>
/// <remarks>
/// LL = −(n/2)(ln 2π + ln(RSS/n) + 1). AIC = −2LL + 2k (Akaike 1974). AICc = AIC + 2k(k + 1)/(n − k − 1) (Hurvich and Tsai 1989);
/// undefined for n ≤ k + 1. BIC = −2LL + k ln n (Schwarz 1978). All undefined at an exact fit, where the likelihood has no maximum.
/// </remarks>
public static class InformationCriteria
{
    /// <summary>LL.</summary>
    /// <param name="residualSumOfSquares">RSS, above zero.</param>
    /// <param name="rows">n.</param>
    public static double LogLikelihood(DoubleDouble residualSumOfSquares, int rows) =>
        -0.5 * rows * (Math.Log(2.0 * Math.PI) + DoubleDouble.Log(residualSumOfSquares / rows) + 1.0);

    /// <summary>AIC.</summary>
    public static double Akaike(double logLikelihood, int coefficients) => (-2.0 * logLikelihood) + (2.0 * (coefficients + 1));

    /// <summary>AICc, or null for too few rows.</summary>
    public static double? AkaikeCorrected(double logLikelihood, int coefficients, int rows) =>
        SmallSamplePenalty(coefficients, rows) is { } penalty ? (-2.0 * logLikelihood) + penalty : null;

    /// <summary>BIC.</summary>
    public static double Schwarz(double logLikelihood, int coefficients, int rows) =>
        (-2.0 * logLikelihood) + ((coefficients + 1) * Math.Log(rows));

    /// <summary>What AICc adds to −2LL: 2kn/(n − k − 1), or null for n ≤ k + 1.</summary>
    internal static double? SmallSamplePenalty(int coefficients, int rows)
    {
        var parameters = coefficients + 1;
        var left = rows - parameters - 1;
        return left > 0 ? 2.0 * parameters * rows / left : null;
    }

    /// <summary>By how much −2LL rises when RSS rises by a share of itself: n ln(1 + share), right for small shares too.</summary>
    internal static double DevianceRise(DoubleDouble share, int rows) => rows * DoubleDouble.Log(DoubleDouble.One + share);
}
