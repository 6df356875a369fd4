using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>Correlation of a variable with itself in neighbouring rows, where the order of the rows means something.</summary>
public static class Autocorrelation
{
    /// <summary>
    /// r₁ = Σ(xᵢ − mean)(xᵢ₊₁ − mean)/Σ(xᵢ − mean)², the mean and the lower sum over all values present, the upper sum over
    /// neighbouring rows neither of which is missing (NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.5.12).
    /// </summary>
    /// <returns>The autocorrelation at lag 1; null for fewer than 2 values or without spread.</returns>
    /// <exception cref="ArgumentException">A value is infinite.</exception>
    public static double? Lag1(NumberColumn column)
    {
        var moments = Moments.Of(PresentValues.Of(column));
        if (moments.Count < 2 || !moments.HasSpread)
        {
            return null;
        }

        var products = DoubleDouble.Zero;
        var previous = DoubleDouble.Zero;
        for (var row = 0; row < column.Rows; row++)
        {
            // a missing row leaves no deviation, and so no product with its neighbours
            var deviation = DoubleDouble.Zero;
            if (!column.IsMissing(row))
            {
                var value = DoubleDouble.FromSum(column.Values[row], column.Remainders.IsEmpty ? 0 : column.Remainders[row]);
                deviation = DoubleDouble.ScaleB(value, -moments.Exponent) - moments.Mean;
            }

            products += previous * deviation;
            previous = deviation;
        }

        return (products / moments.Second).Hi;
    }
}
