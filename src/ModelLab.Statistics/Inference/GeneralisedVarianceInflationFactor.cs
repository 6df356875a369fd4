using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// By how much the joint confidence region of a term's coefficients (its squared volume) is larger than if the term were uncorrelated
/// with all others: GVIF = det(C₁₁) · det(C₂₂)/det(C), C the correlations of all columns, C₁₁ those of the term's own, C₂₂ those of the
/// others.
/// </summary>
/// <remarks>
/// The choice of the reference category does not change it, and for one column it is the VIF. To compare terms of different numbers of
/// columns q, take GVIF^(1/(2q)). By the inverse of a partitioned matrix, det(C₂₂)/det(C) is the determinant of the term's block of C⁻¹,
/// so the figure is formed from the block of (X'X)⁻¹ and the centred cross products alone. Undefined without intercept.
/// Source: Fox and Monette (1992), "Generalized collinearity diagnostics", Journal of the American Statistical Association 87.
/// </remarks>
internal static class GeneralisedVarianceInflationFactor
{
    /// <summary>GVIF of columns <paramref name="first"/> to first + count − 1, or null without intercept.</summary>
    public static DoubleDouble? Of(LeastSquaresFit fit, int first, int count)
    {
        if (!fit.Design.Specification.Intercept)
        {
            return null;
        }

        var own = SymmetricFactor.Of(count, (row, column) => fit.CentredProduct(first + row, first + column));
        var inverse = SymmetricFactor.Of(count, (row, column) => fit.CrossProductInverse(first + row, first + column));

        // The roots of the determinants are multiplied factor by factor, so that neither leaves the range of double.
        var product = DoubleDouble.One;
        for (var i = 0; i < count; i++)
        {
            product *= own[i, i] * inverse[i, i];
        }

        return product * product;
    }
}
