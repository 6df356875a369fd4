using System.Runtime.CompilerServices;

namespace ModelLab.Statistics.Distributions;

/// <summary>Refuses arguments outside the domain of a distribution.</summary>
internal static class DistributionArgument
{
    /// <summary>Degrees of freedom: above 0, infinity allowed.</summary>
    public static void RequireDegreesOfFreedom(double df, [CallerArgumentExpression(nameof(df))] string? name = null)
    {
        if (!(df > 0))
        {
            throw new ArgumentOutOfRangeException(name, df, "Degrees of freedom must be above 0.");
        }
    }

    /// <summary>A place: any number, infinities allowed.</summary>
    public static void RequireNumber(double value, [CallerArgumentExpression(nameof(value))] string? name = null)
    {
        if (double.IsNaN(value))
        {
            throw new ArgumentOutOfRangeException(name, value, "The value is not a number.");
        }
    }

    /// <summary>A probability strictly between 0 and 1.</summary>
    public static void RequireProbability(double probability, [CallerArgumentExpression(nameof(probability))] string? name = null)
    {
        if (!(probability > 0 && probability < 1))
        {
            throw new ArgumentOutOfRangeException(name, probability, "A tail probability must lie between 0 and 1, both excluded.");
        }
    }
}
