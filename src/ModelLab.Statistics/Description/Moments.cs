using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>Mean and sums of powers about it, in double-double, of values scaled by a power of two.</summary>
/// <param name="Count">Number of values, n.</param>
/// <param name="Exponent">The figures are of value·2^−Exponent.</param>
/// <param name="Mean">Σx/n; 0 for n = 0.</param>
/// <param name="Second">Σ(x − mean)².</param>
/// <param name="Third">Σ(x − mean)³.</param>
/// <param name="Fourth">Σ(x − mean)⁴.</param>
/// <param name="HasSpread">Whether two values differ as written.</param>
internal sealed record Moments(
    int Count, int Exponent, DoubleDouble Mean, DoubleDouble Second, DoubleDouble Third, DoubleDouble Fourth, bool HasSpread)
{
    /// <summary>Of the values present in a column.</summary>
    public static Moments Of(PresentValues values) => CentredValues.Of(values.Values, values.Remainders).Moments();
}
