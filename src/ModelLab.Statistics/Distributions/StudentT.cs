using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// Student's t. P(|T| ≥ t) = I_x(df/2, ½), x = df/(df + t²), computed directly to at least 14 digits (15 in the tests) for
/// the doubles given; probabilities below the smallest double are 0. Degrees of freedom may be fractional, above 0; infinite
/// ones are the normal distribution.
/// </summary>
public static class StudentT
{
    /// <summary>P(|T| ≥ |t|) on <paramref name="df"/> &gt; 0 degrees of freedom, computed directly (never 1 − CDF).</summary>
    /// <exception cref="ArgumentOutOfRangeException">t is not a number or df is not above 0.</exception>
    public static double TwoSided(double t, double df)
    {
        DistributionArgument.RequireNumber(t);
        DistributionArgument.RequireDegreesOfFreedom(df);
        t = Math.Abs(t);
        return t switch
        {
            0 => 1,
            double.PositiveInfinity => 0,
            _ => double.IsPositiveInfinity(df) ? Normal.TwoSided(t) : Split(t, df).Probability(true),
        };
    }

    /// <summary>P(T ≥ t).</summary>
    /// <exception cref="ArgumentOutOfRangeException">t is not a number or df is not above 0.</exception>
    public static double UpperTail(double t, double df)
    {
        var half = 0.5 * TwoSided(t, df);
        return t >= 0 ? half : 1 - half;
    }

    /// <summary>The t with P(T ≥ t) = <paramref name="upperTail"/>, 0 &lt; upperTail &lt; 1.</summary>
    /// <returns>The quantile; infinite where it exceeds the largest double.</returns>
    /// <exception cref="ArgumentOutOfRangeException">upperTail is not between 0 and 1 or df is not above 0.</exception>
    public static double UpperQuantile(double upperTail, double df)
    {
        DistributionArgument.RequireProbability(upperTail);
        DistributionArgument.RequireDegreesOfFreedom(df);
        if (double.IsPositiveInfinity(df))
        {
            return Normal.UpperQuantile(upperTail);
        }

        return upperTail switch
        {
            0.5 => 0,
            // exact: 1 − p of a double above ½ is a double
            > 0.5 => -UpperQuantile(1 - upperTail, df),
            _ => TailQuantile.Find(t => Split(t, df), 2 * upperTail, Normal.Approximate(upperTail), 2),
        };
    }

    private static SplitTail Split(double t, double df)
    {
        // the power is taken out first, so that t² neither overflows nor loses its remainder
        var power = Math.ILogB(t);
        var mantissa = Math.ScaleB(t, -power);
        var share = Share.Of(df, (DoubleDouble)mantissa * mantissa, 2 * power);
        return IncompleteBeta.Split(share, df / 2, 0.5);
    }
}
