namespace ModelLab.Statistics.Distributions;

/// <summary>
/// Turns a tail round: Newton's method on ln probability against ln x, kept inside a bracket that every step narrows
/// (the tail is monotone), bisecting where a step would leave it.
/// </summary>
internal static class TailQuantile
{
    private const double LongestStep = 40;
    private const double Settled = 1e-11;
    private const int MostSteps = 500;

    /// <summary>The x &gt; 0 that leaves <paramref name="upperTail"/> above it.</summary>
    /// <param name="split">Cuts the distribution at a positive x.</param>
    /// <param name="upperTail">Probability above, between 0 and 1; above ½ the lower side, 1 − upperTail, is solved for, which is exact.</param>
    /// <param name="start">A first guess; anything not positive and finite is replaced by 1.</param>
    /// <param name="power">d ln x of the cut over d ln x: 2 for t and the normal, whose cut is at a square.</param>
    /// <returns>The quantile; infinity where it exceeds the largest double, 0 where it lies below the smallest.</returns>
    public static double Find(Func<double, SplitTail> split, double upperTail, double start, double power = 1)
    {
        var upper = upperTail <= 0.5;
        var goal = Logarithm.Of(upper ? upperTail : 1 - upperTail);
        var x = start > 0 && double.IsFinite(start) ? start : 1;
        double low = 0, high = double.PositiveInfinity;
        for (var i = 0; i < MostSteps; i++)
        {
            var tail = split(x);
            var excess = (tail.LogProbability(upper) - goal).Hi;
            var tooLow = upper ? excess > 0 : excess < 0;
            if (tooLow)
            {
                low = x;
            }
            else
            {
                high = x;
            }

            // ln-step towards the root; the slope is negative for the upper side and positive for the lower
            var step = Math.Abs(excess) / (tail.Elasticity(upper) * power);
            step = (tooLow ? 1 : -1) * (double.IsNaN(step) ? LongestStep : Math.Min(step, LongestStep));
            if (Math.Abs(step) < Settled)
            {
                // Newton squares the error: after this step it lies far below a unit of the last place.
                return x + (x * step);
            }

            if (tooLow ? x == double.MaxValue : x == double.Epsilon)
            {
                return tooLow ? double.PositiveInfinity : 0;
            }

            var next = Math.Clamp(x * Math.Exp(step), double.Epsilon, double.MaxValue);
            if (next <= low || next >= high)
            {
                next = Math.Clamp(Between(low, high), double.Epsilon, double.MaxValue);
            }

            if (next == x)
            {
                return x;
            }

            x = next;
        }

        return x;
    }

    // an end not reached yet is approached by factors, the gap between two ends halved
    private static double Between(double low, double high)
    {
        if (low == 0)
        {
            return high / 1024;
        }

        return double.IsInfinity(high) ? low * 1024 : low + ((high - low) / 2);
    }
}
