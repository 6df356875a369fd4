using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// Fisher's F. P(F ≥ f) = I_x(df2/2, df1/2), x = df2/(df2 + df1·f), computed directly to at least 14 digits (15 in the
/// tests) for the doubles given; probabilities below the smallest double are 0. Degrees of freedom may be fractional, above
/// 0; df2 may be infinite (df1·F is then chi-squared). The time grows with the square root of the smaller of the two.
/// </summary>
public static class FisherF
{
    /// <summary>P(F ≥ f) on (df1, df2); 1 for f ≤ 0.</summary>
    /// <exception cref="ArgumentOutOfRangeException">f is not a number, df1 is not above 0 and finite, or df2 is not above 0.</exception>
    public static double UpperTail(double f, double df1, double df2)
    {
        DistributionArgument.RequireNumber(f);
        RequireDegreesOfFreedom(df1, df2);
        return f switch
        {
            <= 0 => 1,
            double.PositiveInfinity => 0,
            _ => Split(f, df1, df2).Probability(true),
        };
    }

    /// <summary>The f with P(F ≥ f) = <paramref name="upperTail"/>, 0 &lt; upperTail &lt; 1.</summary>
    /// <returns>The quantile; infinity where it exceeds the largest double.</returns>
    /// <exception cref="ArgumentOutOfRangeException">upperTail is not between 0 and 1, df1 is not above 0 and finite, or df2 is not above 0.</exception>
    public static double UpperQuantile(double upperTail, double df1, double df2)
    {
        DistributionArgument.RequireProbability(upperTail);
        RequireDegreesOfFreedom(df1, df2);
        return TailQuantile.Find(f => Split(f, df1, df2), upperTail, Approximate(upperTail, df1, df2));
    }

    private static SplitTail Split(double f, double df1, double df2)
    {
        if (double.IsPositiveInfinity(df2))
        {
            var half = (DoubleDouble)df1 * (f / 2);
            return IncompleteGamma.Split(df1 / 2, half, Logarithm.Of(f) + Logarithm.Of(df1) - Exponential.Ln2);
        }

        // the power is taken out first, so that df1·f neither overflows nor loses its remainder
        var power = Math.ILogB(f);
        var share = Share.Of(df2, (DoubleDouble)df1 * Math.ScaleB(f, -power), power);
        return IncompleteBeta.Split(share, df2 / 2, df1 / 2);
    }

    // Paulson (1942): the cube root of F is nearly a ratio of normals, each as Wilson and Hilferty have it.
    private static double Approximate(double upperTail, double df1, double df2)
    {
        var z = Normal.Approximate(upperTail);
        var s1 = 2 / (9 * df1);
        var s2 = 2 / (9 * df2);
        var a = 1 - s1;
        var b = 1 - s2;
        var denominator = (b * b) - (z * z * s2);
        var root = ((a * b) + (z * Math.Sqrt((a * a * s2) + (b * b * s1) - (z * z * s1 * s2)))) / denominator;
        return denominator > 0 ? root * root * root : 1;
    }

    private static void RequireDegreesOfFreedom(double df1, double df2)
    {
        DistributionArgument.RequireDegreesOfFreedom(df1);
        DistributionArgument.RequireDegreesOfFreedom(df2);
        if (double.IsPositiveInfinity(df1))
        {
            throw new ArgumentOutOfRangeException(nameof(df1), df1, "The numerator of F needs finite degrees of freedom.");
        }
    }
}
