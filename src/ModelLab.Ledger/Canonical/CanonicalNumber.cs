using System.Globalization;

namespace ModelLab.Ledger.Canonical;

/// <summary>
/// The one text of a double in canonical JSON: what ECMAScript's Number::toString gives
/// (RFC 8785 section 3.2.2.3; ECMA-262, Number::toString with radix 10). The digits are the shortest that lead
/// back to the same double; only where the point and the exponent stand is decided here.
/// </summary>
public static class CanonicalNumber
{
    /// <summary>Bytes that hold any number's text: sign, "0.", five zeros, 17 digits make 25.</summary>
    public const int MaximumLength = 32;

    /// <summary>Largest integer up to which every integer is a double: 2^53.</summary>
    public const long LargestExactInteger = 1L << 53;

    /// <summary>The canonical text.</summary>
    /// <param name="value">A finite number; minus zero is written as 0.</param>
    /// <exception cref="ArgumentException">Not a number, or infinite.</exception>
    public static string Text(double value)
    {
        Span<byte> text = stackalloc byte[MaximumLength];
        var length = Write(value, text);
        return System.Text.Encoding.ASCII.GetString(text[..length]);
    }

    /// <summary>Writes the canonical text as ASCII.</summary>
    /// <param name="value">A finite number; minus zero is written as 0.</param>
    /// <param name="destination">At least <see cref="MaximumLength"/> bytes.</param>
    /// <returns>Bytes written.</returns>
    /// <exception cref="ArgumentException">Not a number, infinite, or too small a destination.</exception>
    public static int Write(double value, Span<byte> destination)
    {
        if (!double.IsFinite(value))
        {
            throw new ArgumentException("JSON has no form for NaN or infinity; record null, or a word as text.", nameof(value));
        }

        if (destination.Length < MaximumLength)
        {
            throw new ArgumentException($"A number needs room for {MaximumLength} bytes.", nameof(destination));
        }

        if (value == 0)
        {
            destination[0] = (byte)'0';
            return 1;
        }

        Span<byte> digits = stackalloc byte[MaximumLength];
        var (count, point) = ShortestDigits(Math.Abs(value), digits);
        var written = 0;
        if (value < 0)
        {
            destination[written++] = (byte)'-';
        }

        return written + Place(digits[..count], point, destination[written..]);
    }

    /// <summary>Digits d1…dk without leading or trailing zeros, and n such that the value is 0.d1…dk × 10^n.</summary>
    private static (int Count, int Point) ShortestDigits(double magnitude, Span<byte> digits)
    {
        Span<byte> text = stackalloc byte[MaximumLength];
        // "R" gives the shortest digits that read back as the same double, the closest of them where several are as short.
        if (!magnitude.TryFormat(text, out var length, "R", CultureInfo.InvariantCulture))
        {
            throw new InvalidOperationException("A double's digits exceed the room set aside.");
        }

        text = text[..length];
        var exponent = 0;
        var e = text.IndexOf((byte)'E');
        if (e >= 0)
        {
            exponent = int.Parse(text[(e + 1)..], NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture);
            text = text[..e];
        }

        var dot = text.IndexOf((byte)'.');
        var whole = dot < 0 ? text.Length : dot;
        var count = 0;
        var leading = 0;
        foreach (var c in text)
        {
            if (c == '.')
            {
                continue;
            }

            if (count == 0 && c == '0')
            {
                leading++;
                continue;
            }

            digits[count++] = c;
        }

        while (digits[count - 1] == '0')
        {
            count--;
        }

        return (count, whole - leading + exponent);
    }

    private static int Place(ReadOnlySpan<byte> digits, int point, Span<byte> to)
    {
        var k = digits.Length;
        if (k <= point && point <= 21)
        {
            digits.CopyTo(to);
            to[k..point].Fill((byte)'0');
            return point;
        }

        if (point is > 0 and <= 21)
        {
            digits[..point].CopyTo(to);
            to[point] = (byte)'.';
            digits[point..].CopyTo(to[(point + 1)..]);
            return k + 1;
        }

        if (point is > -6 and <= 0)
        {
            to[0] = (byte)'0';
            to[1] = (byte)'.';
            to.Slice(2, -point).Fill((byte)'0');
            digits.CopyTo(to[(2 - point)..]);
            return 2 - point + k;
        }

        var written = 0;
        to[written++] = digits[0];
        if (k > 1)
        {
            to[written++] = (byte)'.';
            digits[1..].CopyTo(to[written..]);
            written += k - 1;
        }

        to[written++] = (byte)'e';
        var exponent = point - 1;
        to[written++] = exponent < 0 ? (byte)'-' : (byte)'+';
        Math.Abs(exponent).TryFormat(to[written..], out var more, default, CultureInfo.InvariantCulture);
        return written + more;
    }
}
