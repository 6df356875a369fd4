namespace ModelLab.Statistics.Numerics;

/// <summary>Reads a decimal as written into a double and the remainder that rounding took away.</summary>
/// <remarks>
/// Value plus remainder is the decimal to about 32 digits. Up to 15 digits with small exponents take one division and one fused
/// multiply-add (Clinger 1990); up to 19 digits a division in two steps that proves its own rounding; everything else is settled in
/// whole numbers of any length by <see cref="LongDecimal"/>. The value is always the double nearest to the decimal (ties to even).
/// </remarks>
public static class DecimalReader
{
    /// <summary>Longest text that is taken for a number.</summary>
    public const int MaximumLength = 1000;

    // 10^22 is the largest power of ten that a double holds exactly.
    private static readonly double[] PowersOfTen =
    [
        1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22,
    ];

    /// <summary>
    /// Reads <c>[sign]digits[mark digits][e[sign]digits]</c>, nothing around it; the digits on one side of the mark may be left out
    /// (<c>.5</c>, <c>760.</c>). Finite only; no thousands marks. A zero is positive whatever its sign.
    /// </summary>
    /// <param name="text">The characters (ASCII digits), at most <see cref="MaximumLength"/>.</param>
    /// <param name="decimalMark">'.' or ','.</param>
    /// <param name="value">The nearest double.</param>
    /// <param name="remainder">Decimal − value, to double accuracy; 0 where exact.</param>
    /// <returns>Whether the whole text is such a number.</returns>
    public static bool TryRead(ReadOnlySpan<char> text, char decimalMark, out double value, out double remainder)
    {
        value = 0.0;
        remainder = 0.0;
        if (text.IsEmpty || text.Length > MaximumLength || !TryScan(text, decimalMark, out var scan))
        {
            return false;
        }

        if (scan.Significant == 0)
        {
            return true;
        }

        var read = scan.Significant <= 19
            && scan.Exponent is >= -22 and <= 22
            && TryShort(scan.Mantissa, (int)scan.Exponent, out value, out remainder);
        if (!read && !LongDecimal.TryRead(text, decimalMark, scan.Exponent, out value, out remainder))
        {
            return false;
        }

        if (scan.Negative)
        {
            value = -value;
            remainder = 0.0 - remainder;
        }

        return true;
    }

    private static bool TryScan(ReadOnlySpan<char> text, char decimalMark, out Scan scan)
    {
        scan = default;
        var at = 0;
        if (text[0] is '-' or '+')
        {
            scan.Negative = text[0] == '-';
            at = 1;
        }

        var digits = 0;
        var pendingZeros = 0; // zeros that count only if another digit follows
        var fraction = false;
        for (; at < text.Length; at++)
        {
            var digit = (uint)(text[at] - '0');
            if (digit <= 9)
            {
                digits++;
                scan.Exponent -= fraction ? 1 : 0;
                if (digit == 0)
                {
                    pendingZeros += scan.Significant == 0 ? 0 : 1;
                    continue;
                }

                scan.Take(pendingZeros, digit);
                pendingZeros = 0;
            }
            else if (text[at] == decimalMark && !fraction)
            {
                fraction = true;
            }
            else
            {
                break;
            }
        }

        scan.Exponent += pendingZeros;
        return digits > 0 && (at == text.Length || TryScanExponent(text[at..], ref scan));
    }

    private static bool TryScanExponent(ReadOnlySpan<char> text, ref Scan scan)
    {
        if (text[0] is not ('e' or 'E'))
        {
            return false;
        }

        var at = 1;
        var negative = false;
        if (text.Length > 1 && text[1] is '-' or '+')
        {
            negative = text[1] == '-';
            at = 2;
        }

        if (at == text.Length)
        {
            return false;
        }

        long exponent = 0;
        for (; at < text.Length; at++)
        {
            if (!char.IsAsciiDigit(text[at]))
            {
                return false;
            }

            exponent = Math.Min((exponent * 10) + (text[at] - '0'), 1_000_000); // far beyond the range either way
        }

        scan.Exponent += negative ? -exponent : exponent;
        return true;
    }

    private static bool TryShort(ulong mantissa, int exponent, out double value, out double remainder)
    {
        if (mantissa <= 1UL << 53)
        {
            var whole = (double)(long)mantissa;
            if (exponent >= 0)
            {
                var product = DoubleDouble.FromProduct(whole, PowersOfTen[exponent]);
                value = product.Hi;
                remainder = product.Lo;
                return true;
            }

            var power = PowersOfTen[-exponent];
            value = whole / power;
            remainder = Math.FusedMultiplyAdd(-value, power, whole) / power; // the difference in the numerator is exact
            return true;
        }

        // 2^53 and more: the mantissa itself is a sum of two doubles.
        var split = DoubleDouble.FromSum((mantissa >> 32) * 4294967296.0, (double)(long)(mantissa & 0xFFFFFFFF));
        if (exponent == 0)
        {
            value = split.Hi;
            remainder = split.Lo;
            return true;
        }

        if (exponent > 0)
        {
            value = remainder = 0.0;
            return false;
        }

        return TryDivide(split, PowersOfTen[-exponent], out value, out remainder);
    }

    private static bool TryDivide(DoubleDouble mantissa, double power, out double value, out double remainder)
    {
        var first = mantissa.Hi / power;
        var rest = DoubleDouble.FromSum(Math.FusedMultiplyAdd(-first, power, mantissa.Hi), mantissa.Lo);
        var second = rest.Hi / power;
        var third = (Math.FusedMultiplyAdd(-second, power, rest.Hi) + rest.Lo) / power;
        var quotient = DoubleDouble.FromOrderedSum(first, second);
        value = quotient.Hi;
        remainder = quotient.Lo + third;

        // The remainder is right to about 2^-52 of itself. If stretching it by more than that would not carry the value to a
        // neighbour, the value is the nearest double; otherwise the decimal lies at a tie and whole numbers must decide.
        return value + (remainder * (1.0 + (1.0 / (1L << 48)))) == value;
    }

    private struct Scan
    {
        public bool Negative;
        public ulong Mantissa;
        public int Significant;
        public long Exponent;

        public void Take(int zeros, uint digit)
        {
            Significant += zeros + 1;
            if (Significant > 19)
            {
                return; // the digits are read again from the text
            }

            for (; zeros > 0; zeros--)
            {
                Mantissa *= 10;
            }

            Mantissa = (Mantissa * 10) + digit;
        }
    }
}
