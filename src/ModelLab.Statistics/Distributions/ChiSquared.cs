namespace ModelLab.Statistics.Distributions;

/// <summary>
/// Chi-squared. P(χ² ≥ x) = Q(df/2, x/2), computed directly to at least 14 digits (15 in the tests); probabilities below the
/// smallest double are 0. Degrees of freedom may be fractional, above 0 and finite; the time grows with their square root.
/// </summary>
public static class ChiSquared
{
    /// <summary>P(χ² ≥ x); 1 for x ≤ 0.</summary>
    /// <exception cref="ArgumentOutOfRangeException">x is not a number, or df is not above 0 and finite.</exception>
    public static double UpperTail(double x, double df)
    {
        DistributionArgument.RequireNumber(x);
        RequireFinite(df);
        return x switch
        {
            <= 0 => 1,
            double.PositiveInfinity => 0,
            _ => Split(x, df).Probability(true),
        };
    }

    /// <summary>The x with P(χ² ≥ x) = <paramref name="upperTail"/>, 0 &lt; upperTail &lt; 1.</summary>
    /// <exception cref="ArgumentOutOfRangeException">upperTail is not between 0 and 1, or df is not above 0 and finite.</exception>
    public static double UpperQuantile(double upperTail, double df)
    {
        DistributionArgument.RequireProbability(upperTail);
        RequireFinite(df);
        // Wilson and Hilferty (1931): the cube root is nearly normal.
        var spread = 2 / (9 * df);
        var start = df * Math.Pow(1 - spread + (Normal.Approximate(upperTail) * Math.Sqrt(spread)), 3);
        return TailQuantile.Find(x => Split(x, df), upperTail, start);
    }

    internal static SplitTail Split(double x, double df) => IncompleteGamma.Split(df / 2, x / 2, Logarithm.Of(x) - Exponential.Ln2);

    private static void RequireFinite(double df)
    {
        DistributionArgument.RequireDegreesOfFreedom(df);
        if (double.IsPositiveInfinity(df))
        {
            throw new ArgumentOutOfRangeException(nameof(df), df, "Chi-squared needs finite degrees of freedom.");
        }
    }
}
