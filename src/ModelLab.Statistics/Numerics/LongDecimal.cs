using System.Globalization;
using System.Numerics;

namespace ModelLab.Statistics.Numerics;

/// <summary>Reads a decimal of any length in whole numbers. Slow and exact; <see cref="DecimalReader"/> calls it where its short ways do not reach.</summary>
internal static class LongDecimal
{
    /// <summary>Reads the magnitude of a number whose form has been checked.</summary>
    /// <param name="text">The characters, a sign allowed and ignored.</param>
    /// <param name="decimalMark">The decimal mark.</param>
    /// <param name="exponent">Power of ten that the digits without their trailing zeros are multiplied by.</param>
    /// <param name="value">The nearest double.</param>
    /// <param name="remainder">Magnitude − value.</param>
    /// <returns>False where the number lies beyond the largest double.</returns>
    public static bool TryRead(ReadOnlySpan<char> text, char decimalMark, long exponent, out double value, out double remainder)
    {
        value = remainder = 0.0;
        var digits = new char[text.Length];
        var count = 0;
        foreach (var c in text)
        {
            if (char.IsAsciiDigit(c))
            {
                if (count > 0 || c != '0')
                {
                    digits[count++] = c;
                }
            }
            else if (c is 'e' or 'E')
            {
                break;
            }
        }

        while (count > 0 && digits[count - 1] == '0')
        {
            count--;
        }

        var magnitude = exponent + count; // the number lies below 10^magnitude and not below a tenth of it
        if (magnitude > 310)
        {
            return false;
        }

        if (magnitude < -330)
        {
            return true; // nearer to zero than the smallest double
        }

        var written = string.Create(CultureInfo.InvariantCulture, $"{digits.AsSpan(0, count)}e{exponent}");
        value = double.Parse(written, NumberStyles.AllowExponent, CultureInfo.InvariantCulture);
        if (!double.IsFinite(value))
        {
            value = 0.0;
            return false;
        }

        var numerator = BigInteger.Parse(digits.AsSpan(0, count), NumberStyles.None, CultureInfo.InvariantCulture);
        var denominator = BigInteger.One;
        if (exponent >= 0)
        {
            numerator *= BigInteger.Pow(10, (int)exponent);
        }
        else
        {
            denominator = BigInteger.Pow(10, (int)-exponent);
        }

        remainder = Difference(numerator, denominator, value);
        return true;
    }

    // numerator/denominator − value, rounded to a double
    private static double Difference(BigInteger numerator, BigInteger denominator, double value)
    {
        var bits = BitConverter.DoubleToInt64Bits(value);
        var power = (int)((bits >> 52) & 0x7FF);
        var mantissa = bits & 0xFFFFFFFFFFFFFL;
        if (power == 0)
        {
            power = 1;
        }
        else
        {
            mantissa |= 1L << 52;
        }

        power -= 1075;
        if (power < 0)
        {
            numerator <<= -power;
            denominator <<= -power;
        }

        var whole = power > 0 ? (BigInteger)mantissa << power : mantissa;
        var difference = power < 0
            ? numerator - (whole * (denominator >> -power))
            : numerator - (whole * denominator);
        return Quotient(difference, denominator);
    }

    private static double Quotient(BigInteger numerator, BigInteger denominator)
    {
        if (numerator.IsZero)
        {
            return 0.0;
        }

        // Shifted so that the whole quotient has 61 to 63 bits: truncation then errs by less than 2^-60 of it.
        var shift = 62 - (int)(BigInteger.Abs(numerator).GetBitLength() - denominator.GetBitLength());
        var quotient = shift >= 0
            ? (numerator << shift) / denominator
            : numerator / (denominator << -shift);
        return Math.ScaleB((double)(long)quotient, -shift);
    }
}
