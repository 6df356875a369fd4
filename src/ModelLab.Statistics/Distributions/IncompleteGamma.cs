using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// The regularised incomplete gamma functions P(a, x) and Q(a, x), in double-double: the series of P below a + 1 and the
/// continued fraction of Q above (NIST Digital Library of Mathematical Functions, 8.7.1 and 8.9.2).
/// </summary>
internal static class IncompleteGamma
{
    private const double Tolerance = 1e-27;
    private const int MostSteps = 20_000_000;

    // Beyond this many times a + 1 the fraction is 1/x to double-double.
    private const double FarOut = 1e32;

    /// <summary>Cuts at <paramref name="x"/> (positive, finite): "upper" is Q(a, x).</summary>
    /// <param name="a">Shape, &gt; 0.</param>
    /// <param name="x">The place of the cut.</param>
    public static SplitTail Split(double a, DoubleDouble x) => Split(a, x, Logarithm.Of(x));

    /// <summary>The same, with ln x given, for an x that may fall below the smallest double.</summary>
    public static SplitTail Split(double a, DoubleDouble x, DoubleDouble logX)
    {
        var logDensity = (logX * a) - x - LogGamma.Of(a);
        return x.Hi < a + 1
            ? new SplitTail(logDensity, LowerSeries(a, x), false)
            : new SplitTail(logDensity, UpperFraction(a, x), true);
    }

    // P(a, x)·Γ(a)/(x^a e^−x) = Σ xⁿ/(a(a + 1)…(a + n))
    private static DoubleDouble LowerSeries(double a, DoubleDouble x)
    {
        var term = 1.0 / (DoubleDouble)a;
        var sum = term;
        for (var n = 1; n <= MostSteps; n++)
        {
            term *= x / ((DoubleDouble)a + n);
            sum += term;
            // x < a + 1: the terms fall from the first on.
            if (term.Hi < sum.Hi * Tolerance)
            {
                return sum;
            }
        }

        throw DidNotSettle(a);
    }

    // Q(a, x)·Γ(a)/(x^a e^−x) = 1/(x + 1 − a − 1(1 − a)/(x + 3 − a − 2(2 − a)/(x + 5 − a − …)))
    private static DoubleDouble UpperFraction(double a, DoubleDouble x)
    {
        if (x.Hi > FarOut * (a + 1))
        {
            return 1.0 / x;
        }

        var b = x + 1.0 - a;
        DoubleDouble c = 1e300;
        var d = 1.0 / NotZero(b);
        var value = d;
        for (var n = 1; n <= MostSteps; n++)
        {
            var numerator = ((DoubleDouble)a - n) * n;
            b += 2.0;
            d = 1.0 / NotZero((numerator * d) + b);
            c = NotZero(b + (numerator / c));
            var change = c * d;
            value *= change;
            if (Math.Abs((change - 1.0).Hi) < Tolerance)
            {
                return value;
            }
        }

        throw DidNotSettle(a);
    }

    private static DoubleDouble NotZero(DoubleDouble value) => value.Hi == 0 ? 1e-300 : value;

    private static ArithmeticException DidNotSettle(double a) =>
        new($"The incomplete gamma function with a = {a} did not settle: degrees of freedom this large are not supported; use infinity.");
}
