using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// The regularised incomplete beta function I_x(a, b), by its continued fraction (NIST Digital Library of Mathematical
/// Functions, 8.17.22, evaluated by Lentz's method as modified by Thompson and Barnett 1986), throughout in double-double:
/// the powers in front reach e^-700 as a difference of terms many millions in size, which doubles cannot carry.
/// </summary>
internal static class IncompleteBeta
{
    private const double Tolerance = 1e-27;
    private const int MostSteps = 20_000_000;

    /// <summary>
    /// Cuts at x: "upper" is I_x(a, b), the side that vanishes with x, as the upper tails of t and F do.
    /// </summary>
    /// <param name="share">x first, 1 − x second.</param>
    /// <param name="a">Exponent of x, &gt; 0.</param>
    /// <param name="b">Exponent of 1 − x, &gt; 0.</param>
    public static SplitTail Split(Share share, double a, double b)
    {
        var logDensity = (share.LogFirst * a) + (share.LogSecond * b) - LogBeta(a, b);
        // The fraction converges fast up to about the mean; beyond it, that of the other side does.
        return share.First.Hi < (a + 1) / (a + b + 2)
            ? new SplitTail(logDensity, Fraction(share.First, a, b) / a, true)
            : new SplitTail(logDensity, Fraction(share.Second, b, a) / b, false);
    }

    private static DoubleDouble LogBeta(double a, double b) =>
        LogGamma.Of(a) + LogGamma.Of(b) - LogGamma.Of((DoubleDouble)a + b);

    // F with I_x(a, b) = x^a (1 − x)^b / (a B(a, b)) · F
    private static DoubleDouble Fraction(DoubleDouble x, double a, double b)
    {
        var sum = (DoubleDouble)a + b;
        DoubleDouble c = 1.0;
        var d = 1.0 / NotZero(1.0 - (sum * x / ((DoubleDouble)a + 1.0)));
        var value = d;
        for (var m = 1; m <= MostSteps; m++)
        {
            var place = (DoubleDouble)a + (2.0 * m);
            var even = x * m * ((DoubleDouble)b - m) / ((place - 1.0) * place);
            d = 1.0 / NotZero(1.0 + (even * d));
            c = NotZero(1.0 + (even / c));
            value *= c * d;

            var odd = x * ((DoubleDouble)a + m) * (sum + m) / (place * (place + 1.0));
            d = 1.0 / NotZero(1.0 - (odd * d));
            c = NotZero(1.0 - (odd / c));
            var change = c * d;
            value *= change;
            if (Math.Abs((change - 1.0).Hi) < Tolerance)
            {
                return value;
            }
        }

        throw new ArithmeticException($"The incomplete beta function with a = {a}, b = {b} did not settle: degrees of freedom this large are not supported; use infinity.");
    }

    private static DoubleDouble NotZero(DoubleDouble value) => value.Hi == 0 ? 1e-300 : value;
}
