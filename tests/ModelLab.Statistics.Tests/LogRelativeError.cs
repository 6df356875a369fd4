using System.Globalization;

namespace ModelLab.Statistics.Tests;

/// <summary>
/// The number of right digits, −log₁₀ of the relative error (of the absolute error where the expected value is 0),
/// at most 16: beyond that a double says nothing.
/// </summary>
public static class LogRelativeError
{
    public const double Most = 16;

    public static double Of(double value, double expected)
    {
        if (value == expected)
        {
            return Most;
        }

        var error = expected == 0 ? Math.Abs(value) : Math.Abs(value - expected) / Math.Abs(expected);
        return double.IsNaN(error) ? 0 : Math.Clamp(-Math.Log10(error), 0, Most);
    }

    public static double Of(double value, string expected) => Of(value, double.Parse(expected, CultureInfo.InvariantCulture));
}
