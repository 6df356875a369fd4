using ModelLab.Statistics.Distributions;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Description;

/// <summary>Correlation, interval and p of two centred variables; null where undefined.</summary>
internal sealed record CorrelationFigures(double? R, double? Lower, double? Upper, double? P)
{
    // 1 − r² at or below this is rounding of double-double: the relation is exact.
    private const double Exact = 1e-24;

    private static readonly CorrelationFigures None = new(null, null, null, null);

    /// <summary>Computes them.</summary>
    /// <param name="x">First variable.</param>
    /// <param name="y">Second variable, the same rows.</param>
    /// <param name="z">Normal quantile of the confidence level.</param>
    /// <param name="ranks">Whether the values are ranks, which widens the interval.</param>
    public static CorrelationFigures Of(CentredValues x, CentredValues y, double z, bool ranks)
    {
        if (x.Count < 2 || !x.HasSpread || !y.HasSpread)
        {
            return None;
        }

        var cross = x.ProductSum(y);
        var squares = x.SumOfSquares * y.SumOfSquares;
        // 1 − r² on its own, not from r: near |r| = 1 it carries the digits of interval and p
        var unexplained = (squares - (cross * cross)) / squares;
        if (unexplained.Hi <= Exact)
        {
            return None with { R = Math.Sign(cross.Hi) };
        }

        var exact = cross / DoubleDouble.Sqrt(squares);
        var r = exact.Hi;
        var n = x.Count;
        if (n < 3)
        {
            return None with { R = r };
        }

        var p = TwoSided(cross * cross / squares, unexplained, n - 2);
        if (n < 4)
        {
            return new CorrelationFigures(r, null, null, p);
        }

        var centre = FisherTransform(exact, unexplained);
        var variance = (ranks ? 1.0 + (exact * exact * 0.5) : 1.0) / (n - 3.0);
        var width = DoubleDouble.Sqrt(variance) * z;
        return new CorrelationFigures(r, Math.Tanh((centre - width).Hi), Math.Tanh((centre + width).Hi), p);
    }

    // P(|T| ≥ |t|) = I_(1 − r²)(df/2, ½): the shares of t² and df in their sum are r² and 1 − r².
    private static double TwoSided(DoubleDouble explained, DoubleDouble unexplained, int df) =>
        explained.Hi <= 0 ? 1 : IncompleteBeta.Split(Share.Of(unexplained, explained, 0), df / 2.0, 0.5).Probability(true);

    // artanh r = ½ ln((1 + r)²/(1 − r²)), in double-double so that an interval that ends near 0 keeps its digits
    private static DoubleDouble FisherTransform(DoubleDouble r, DoubleDouble unexplained) =>
        Logarithm.Of((1.0 + r) * (1.0 + r) / unexplained) * 0.5;
}
