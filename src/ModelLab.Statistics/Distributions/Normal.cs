using MathNet.Numerics;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// Standard normal. P(|Z| ≥ z) = Q(½, z²/2) (NIST Digital Library of Mathematical Functions, 7.11.2), to at least 14 digits
/// (15 in the tests); probabilities below the smallest double are 0.
/// </summary>
public static class Normal
{
    /// <summary>P(Z ≥ z).</summary>
    /// <exception cref="ArgumentOutOfRangeException">z is not a number.</exception>
    public static double UpperTail(double z)
    {
        DistributionArgument.RequireNumber(z);
        var half = 0.5 * TwoSided(Math.Abs(z));
        return z >= 0 ? half : 1 - half;
    }

    /// <summary>P(|Z| ≥ |z|).</summary>
    /// <exception cref="ArgumentOutOfRangeException">z is not a number.</exception>
    public static double TwoSided(double z)
    {
        DistributionArgument.RequireNumber(z);
        z = Math.Abs(z);
        return z switch
        {
            0 => 1,
            // e^−(z²/2) < 1e-350
            > 40 => 0,
            _ => Split(z).Probability(true),
        };
    }

    /// <summary>The z with P(Z ≥ z) = <paramref name="upperTail"/>, 0 &lt; upperTail &lt; 1.</summary>
    /// <exception cref="ArgumentOutOfRangeException">upperTail is not between 0 and 1.</exception>
    public static double UpperQuantile(double upperTail)
    {
        DistributionArgument.RequireProbability(upperTail);
        return upperTail switch
        {
            0.5 => 0,
            // exact: 1 − p of a double above ½ is a double
            > 0.5 => -UpperQuantile(1 - upperTail),
            _ => TailQuantile.Find(Split, 2 * upperTail, Approximate(upperTail), 2),
        };
    }

    /// <summary>A double's worth of the quantile, to start from.</summary>
    internal static double Approximate(double upperTail) => Constants.Sqrt2 * SpecialFunctions.ErfcInv(2 * upperTail);

    private static SplitTail Split(double z)
    {
        // The square of a z near 0 would lose digits below the smallest double: its logarithm is taken from z.
        var logHalfSquare = (Logarithm.Of(z) * 2.0) - Exponential.Ln2;
        return IncompleteGamma.Split(0.5, (DoubleDouble)z * z * 0.5, logHalfSquare);
    }
}
