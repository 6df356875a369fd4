using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// By how much the variance of a coefficient is larger than if its column were uncorrelated with all others:
/// VIF = 1/(1 − R²ⱼ), R²ⱼ of the column's regression on all others = (X'X)⁻¹ⱼⱼ · Σ(xⱼ − x̄ⱼ)².
/// </summary>
/// <remarks>
/// Undefined without intercept, where R²ⱼ about the mean has no meaning. Source: Marquardt (1970), "Generalized inverses, ridge
/// regression, biased linear estimation, and nonlinear estimation", Technometrics 12.
/// </remarks>
internal static class VarianceInflationFactor
{
    /// <summary>VIF of a column other than the intercept, or null without intercept.</summary>
    public static DoubleDouble? Of(LeastSquaresFit fit, int column) => fit.Design.Specification.Intercept
        ? fit.CrossProductInverse(column, column) * fit.CentredProduct(column, column)
        : null;
}
