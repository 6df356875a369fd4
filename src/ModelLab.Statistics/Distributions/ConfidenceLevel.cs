namespace ModelLab.Statistics.Distributions;

/// <summary>
/// The level of a confidence interval, taken as the decimal that it is written as: the double 0.95 lies 4e-17 beside it,
/// and 1 − 0.95 in doubles would be wrong in the 16th digit.
/// </summary>
public static class ConfidenceLevel
{
    /// <summary>The probability that a two-sided interval leaves above it, (1 − level)/2.</summary>
    /// <param name="level">E.g. 0.95; to 15 digits.</param>
    /// <exception cref="ArgumentOutOfRangeException">The level is not between 0 and 1.</exception>
    public static double UpperTail(double level)
    {
        if (!(level > 0 && level < 1))
        {
            throw new ArgumentOutOfRangeException(nameof(level), level, "A confidence level lies between 0 and 1, e.g. 0.95.");
        }

        // the conversion to decimal rounds to 15 digits; a level even nearer to 1 keeps its double
        var beside = (double)((1 - (decimal)level) / 2);
        return beside > 0 ? beside : (1 - level) / 2;
    }
}
