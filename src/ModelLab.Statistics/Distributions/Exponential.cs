using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// eˣ of a double-double, scaled so that neither overflow nor the smallest doubles cost digits.
/// The argument is reduced by multiples of ln 2, then by 256; Taylor's series of eˣ − 1 is squared back.
/// </summary>
internal static class Exponential
{
    /// <summary>ln 2 to 32 digits (recomputed to 60 digits and split).</summary>
    public static readonly DoubleDouble Ln2 = DoubleDouble.FromSum(0.6931471805599453, 2.3190468138462996e-17);

    private const int Squarings = 8;
    private const double Reduction = 1.0 / (1 << Squarings);

    // The argument is below ln 2 / 512; its 11th power over 11! lies below 1e-38.
    private static readonly DoubleDouble[] InverseFactorials = FormInverseFactorials(11);

    /// <summary>Splits e^<paramref name="exponent"/> into a number between ½ and 2 and a power of two.</summary>
    /// <param name="exponent">Any value whose whole multiple of ln 2 fits an int.</param>
    /// <param name="power">The result is the returned number times 2^power.</param>
    public static DoubleDouble Scaled(DoubleDouble exponent, out int power)
    {
        power = (int)Math.Round(exponent.Hi / Ln2.Hi, MidpointRounding.ToEven);
        var reduced = (exponent - (Ln2 * power)) * Reduction;
        var sum = InverseFactorials[^1];
        for (var i = InverseFactorials.Length - 2; i >= 1; i--)
        {
            sum = (sum * reduced) + InverseFactorials[i];
        }

        // e^(2x) − 1 = 2(eˣ − 1) + (eˣ − 1)²
        var minusOne = sum * reduced;
        for (var i = 0; i < Squarings; i++)
        {
            minusOne = (minusOne * 2.0) + (minusOne * minusOne);
        }

        return minusOne + 1.0;
    }

    /// <summary><paramref name="factor"/>·e^<paramref name="exponent"/> rounded to double once; 0 where it lies below the smallest double.</summary>
    public static double Times(DoubleDouble exponent, DoubleDouble factor)
    {
        // Factors of the tails stay far below e^1000, so that nothing under this bound can come back.
        if (exponent.Hi < -2000)
        {
            return 0;
        }

        var product = Scaled(exponent, out var power) * factor;
        return Math.ScaleB(product.Hi, power);
    }

    // [i] = 1/i!
    private static DoubleDouble[] FormInverseFactorials(int last)
    {
        var values = new DoubleDouble[last + 1];
        values[0] = 1.0;
        for (var i = 1; i <= last; i++)
        {
            values[i] = values[i - 1] / (double)i;
        }

        return values;
    }
}
