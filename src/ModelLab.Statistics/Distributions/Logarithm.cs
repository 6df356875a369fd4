using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// Natural logarithm of a double-double. The library's double logarithm starts one Newton step, so that its own error,
/// which differs between C libraries, is squared away.
/// </summary>
internal static class Logarithm
{
    /// <summary>ln <paramref name="value"/> for a positive, finite value, to about 31 digits (absolute, where it is near 0).</summary>
    public static DoubleDouble Of(DoubleDouble value)
    {
        // mantissa in [√½, √2), so that power·ln 2 and its logarithm do not cancel
        var power = Math.ILogB(value.Hi);
        var mantissa = DoubleDouble.ScaleB(value, -power);
        if (mantissa.Hi > 1.4142135623730951)
        {
            power++;
            mantissa = DoubleDouble.ScaleB(value, -power);
        }

        var start = Math.Log(mantissa.Hi);
        var correction = (mantissa * ScaledBack(-start)) - 1.0;
        // ln(1 + d) = d − d²/2 + …; d is about 1e-16
        correction -= correction * correction * 0.5;
        return (Exponential.Ln2 * (double)power) + (correction + start);
    }

    private static DoubleDouble ScaledBack(double exponent)
    {
        var result = Exponential.Scaled(exponent, out var power);
        return DoubleDouble.ScaleB(result, power);
    }
}
