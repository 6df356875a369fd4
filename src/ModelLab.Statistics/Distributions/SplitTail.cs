using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// A distribution cut in two at x, the natural side of the cut known in double-double: its probability is
/// e^<paramref name="LogDensity"/>·<paramref name="Factor"/>. The other side is one minus that, taken only where no digit
/// of a double can be lost.
/// </summary>
/// <param name="LogDensity">ln(x·density(x)).</param>
/// <param name="Factor">Known side over x·density(x).</param>
/// <param name="KnownIsUpper">Whether the known side is the one above the cut.</param>
internal readonly record struct SplitTail(DoubleDouble LogDensity, DoubleDouble Factor, bool KnownIsUpper)
{
    /// <summary>The probability of one side, rounded to double; 0 below the smallest double.</summary>
    public double Probability(bool upper)
    {
        if (upper == KnownIsUpper)
        {
            return Math.Min(1, Exponential.Times(LogDensity, Factor));
        }

        return Math.Clamp(Other().Hi, 0, 1);
    }

    /// <summary>ln of the probability of one side.</summary>
    public DoubleDouble LogProbability(bool upper) =>
        upper == KnownIsUpper ? LogDensity + Logarithm.Of(Factor) : Logarithm.Of(Other());

    /// <summary>|d ln probability / d ln x| of one side.</summary>
    public double Elasticity(bool upper) =>
        upper == KnownIsUpper ? 1 / Factor.Hi : Exponential.Times(LogDensity, 1.0) / Other().Hi;

    private DoubleDouble Other()
    {
        if (LogDensity.Hi < -2000)
        {
            return 1.0;
        }

        var known = Exponential.Scaled(LogDensity, out var power) * Factor;
        return 1.0 - DoubleDouble.ScaleB(known, power);
    }
}
