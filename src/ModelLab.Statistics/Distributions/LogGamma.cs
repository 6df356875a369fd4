using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// ln Γ in double-double: the argument is raised to 30 or more by Γ(z + 1) = zΓ(z), then Stirling's series
/// (NIST Digital Library of Mathematical Functions, 5.11.1) to the term in z⁻²⁵, whose successor lies below 1e-35.
/// </summary>
internal static class LogGamma
{
    private const double SeriesFrom = 30;

    /// <summary>½ ln 2π (recomputed to 60 digits and split).</summary>
    private static readonly DoubleDouble HalfLogTwoPi = DoubleDouble.FromSum(0.9189385332046728, -3.8782941580672414e-17);

    /// <summary>B₂ₖ/(2k(2k − 1)), k = 1, 2, …; the Bernoulli numbers are those of the Digital Library, table 24.2.1.</summary>
    private static readonly DoubleDouble[] Coefficients = FormCoefficients();

    /// <summary>ln Γ(<paramref name="z"/>), z &gt; 0.</summary>
    public static DoubleDouble Of(DoubleDouble z)
    {
        DoubleDouble product = 1.0;
        var raised = false;
        while (z.Hi < SeriesFrom)
        {
            product *= z;
            z += 1.0;
            raised = true;
        }

        var inverse = 1.0 / z;
        var square = inverse * inverse;
        var series = Coefficients[^1];
        for (var i = Coefficients.Length - 2; i >= 0; i--)
        {
            series = (series * square) + Coefficients[i];
        }

        var result = ((z - 0.5) * Logarithm.Of(z)) - z + HalfLogTwoPi + (series * inverse);
        return raised ? result - Logarithm.Of(product) : result;
    }

    private static DoubleDouble[] FormCoefficients()
    {
        ReadOnlySpan<double> numerators = [1, -1, 1, -1, 5, -691, 7, -3617, 43867, -174611, 854513, -236364091, 8553103];
        ReadOnlySpan<double> denominators = [6, 30, 42, 30, 66, 2730, 6, 510, 798, 330, 138, 2730, 6];
        var coefficients = new DoubleDouble[numerators.Length];
        for (var i = 0; i < coefficients.Length; i++)
        {
            var k = i + 1.0;
            coefficients[i] = (DoubleDouble)numerators[i] / (denominators[i] * 2 * k * ((2 * k) - 1));
        }

        return coefficients;
    }
}
