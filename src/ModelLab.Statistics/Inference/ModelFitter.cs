using ModelLab.Statistics.Designs;
using ModelLab.Statistics.LeastSquares;

namespace ModelLab.Statistics.Inference;

/// <summary>What a fit is to report.</summary>
/// <param name="Confidence">Level of the intervals, e.g. 0.95.</param>
/// <param name="HeldIn">Terms that may not be removed.</param>
/// <param name="FullModelMeanSquare">Residual mean square of the full model on the same rows, for Mallows' Cp; null: no Cp.</param>
public sealed record FitOptions(double Confidence, IReadOnlyCollection<Term> HeldIn, double? FullModelMeanSquare = null);

/// <summary>Fits by least squares, accuracy first.</summary>
public static class ModelFitter
{
    /// <summary>Version of the method, kept with every stored figure.</summary>
    public const string MethodVersion = "least-squares/1";

    /// <summary>Fits a design.</summary>
    /// <exception cref="ModelRefusedException">Too few rows, a constant outcome, rank deficiency.</exception>
    /// <exception cref="ArgumentOutOfRangeException">The confidence level does not lie between 0 and 1.</exception>
    public static FittedModel Fit(Design design, FitOptions options)
    {
        ArgumentNullException.ThrowIfNull(design);
        ArgumentNullException.ThrowIfNull(options);
        if (options.Confidence is not (> 0.0 and < 1.0))
        {
            throw new ArgumentOutOfRangeException(nameof(options), options.Confidence, "The confidence level lies between 0 and 1, for example 0.95.");
        }

        return new FittedModel(LeastSquaresFit.Solve(design), options);
    }
}
