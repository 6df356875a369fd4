using ModelLab.Statistics.Designs;
using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// The coefficient in units of standard deviations: b·SD(x)/SD(y), sample SDs of the analysed rows.
/// </summary>
/// <remarks>
/// None for the intercept, for 0/1 columns of a category and without intercept. Where a variable has powers in the model, the
/// coefficients are those of the same polynomial in z = (x − x̄)/SD(x): with b₁ … b_m of x … xᵐ, the one of zᵏ is
/// SD(x)ᵏ/SD(y) · Σⱼ₌ₖ C(j, k) bⱼ x̄ʲ⁻ᵏ. They exist where every lower power is in the model too.
/// </remarks>
internal static class StandardisedCoefficient
{
    /// <summary>The standardised coefficient of every column; null where there is none.</summary>
    public static DoubleDouble?[] Of(LeastSquaresFit fit)
    {
        var design = fit.Design;
        var results = new DoubleDouble?[fit.Columns];
        if (!design.Specification.Intercept)
        {
            return results;
        }

        var numeric = Enumerable.Range(0, fit.Columns).Where(column => design.Columns[column] is { Term: not null, Category: null });
        foreach (var variable in numeric.GroupBy(column => design.Columns[column].Term!.Variables[0], StringComparer.Ordinal))
        {
            var powers = variable.OrderBy(column => Degree(design.Columns[column].Term!)).ToArray();
            if (Degree(design.Columns[powers[^1]].Term!) == powers.Length)
            {
                for (var degree = 1; degree <= powers.Length; degree++)
                {
                    results[powers[degree - 1]] = FromPowers(fit, powers, degree);
                }
            }
        }

        return results;
    }

    // The columns of x, x² … of one variable, all of them up to the highest.
    private static DoubleDouble FromPowers(LeastSquaresFit fit, int[] powers, int degree)
    {
        // All in the scaled units of the design: column k of the variable is its scaled value to the power k.
        var linear = powers[0];
        var mean = fit.Triangular(0, linear) / fit.Triangular(0, 0);
        var sum = DoubleDouble.Zero;
        DoubleDouble factor = 1.0; // C(j, degree) · mean^(j − degree)
        for (var j = degree; j <= powers.Length; j++)
        {
            sum += factor * fit.Coefficient(powers[j - 1]);
            factor = factor * mean * (j + 1.0) / (j + 1.0 - degree);
        }

        var deviation = DoubleDouble.Sqrt(fit.CentredProduct(linear, linear) / (fit.Rows - 1.0));
        return sum * DoubleDouble.Pow(deviation, degree) / DoubleDouble.Sqrt(fit.TotalSumOfSquares / (fit.Rows - 1.0));
    }

    private static int Degree(Term term) => term is PowerTerm power ? power.Degree : 1;
}
