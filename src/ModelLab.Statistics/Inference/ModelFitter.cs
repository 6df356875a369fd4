using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Inference;

/// <summary>What a fit is to report.</summary>
/// <param name="Confidence">Level of the intervals, e.g. 0.95.</param>
/// <param name="HeldIn">Terms that may not be removed.</param>
/// <param name="FullModelMeanSquare">Residual mean square of the full model on the same rows, for Mallows' Cp; null: no Cp.</param>
public sealed record FitOptions(double Confidence, IReadOnlyCollection<Term> HeldIn, double? FullModelMeanSquare = null);

/// <summary>Row-wise results, one value a row analysed, in the order of the rows.</summary>
/// <param name="Fitted">ŷ.</param>
/// <param name="Residual">y − ŷ.</param>
/// <param name="Leverage">Diagonal of X(X'X)⁻¹X'.</param>
/// <param name="StudentizedInternal">e/(s√(1 − h)); null where s = 0 or h = 1.</param>
/// <param name="StudentizedExternal">The same with s of the fit without the row.</param>
/// <param name="CooksDistance">r²h/(p(1 − h)), r internally studentised (Cook 1977).</param>
public sealed record RowResults(
    double[] Fitted, double[] Residual, double[] Leverage,
    double?[] StudentizedInternal, double?[] StudentizedExternal, double?[] CooksDistance);

/// <summary>A fitted model: its figures, and its rows when asked.</summary>
public sealed class FittedModel
{
    /// <summary>The figures.</summary>
    public ModelResults Results => throw new NotImplementedException();

    /// <summary>Computes the row-wise results.</summary>
    public RowResults Rows() => throw new NotImplementedException();
}

/// <summary>Fits by least squares, accuracy first.</summary>
public static class ModelFitter
{
    /// <summary>Version of the method, kept with every stored figure.</summary>
    public const string MethodVersion = "least-squares/1";

    /// <summary>Fits a design.</summary>
    /// <exception cref="ModelRefusedException">Too few rows, a constant outcome, rank deficiency.</exception>
    public static FittedModel Fit(Design design, FitOptions options) => throw new NotImplementedException();
}
