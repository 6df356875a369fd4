using System.Globalization;

namespace ModelLab.Intake.Csv.Reading;

/// <summary>How a cell is written, found without knowing the decimal mark of its file.</summary>
internal enum NumberForm
{
    /// <summary>No number.</summary>
    None,

    /// <summary>A number without a decimal mark.</summary>
    Plain,

    /// <summary>A number with one point.</summary>
    Point,

    /// <summary>A number with one comma.</summary>
    Comma,

    /// <summary>Digits in groups of three with separators that no decimal mark explains, such as 1.234.567, 1 234 or 1,234.5.</summary>
    Grouped,
}

/// <summary>A cell seen as a number.</summary>
/// <param name="Form">How it is written.</param>
/// <param name="Value">Its value to double accuracy; 0 where it is no number.</param>
/// <param name="Whole">Whether it is a whole number.</param>
/// <param name="GroupLike">Whether its one mark could as well separate thousands, as in 1,234 or 12.345.</param>
/// <param name="LeadingZero">Whether a zero stands before further whole digits, as in 007.</param>
internal readonly record struct CellShape(NumberForm Form, double Value, bool Whole, bool GroupLike, bool LeadingZero)
{
    private const int MostDigitsOfExactValue = 15;
    private const int MostExactPowerOfTen = 22;

    private static readonly double[] PowersOfTen = [.. Enumerable.Range(0, MostExactPowerOfTen + 1).Select(k => double.Parse($"1e{k}", CultureInfo.InvariantCulture))];

    /// <summary>Whether it is a number under one decimal mark or the other.</summary>
    internal bool IsNumber => Form is NumberForm.Plain or NumberForm.Point or NumberForm.Comma;

    /// <summary>Looks at a cell, spaces around it left out: <c>[sign]digits[mark digits][e[sign]digits]</c>, where digits on one side of the mark are enough.</summary>
    internal static CellShape Of(ReadOnlySpan<byte> cell) => OfTrimmed(CellText.Trim(cell));

    /// <summary>As <see cref="Of"/>, for a cell without spaces around it.</summary>
    internal static CellShape OfTrimmed(ReadOnlySpan<byte> text)
    {
        var i = text.Length > 0 && text[0] is (byte)'+' or (byte)'-' ? 1 : 0;
        if (i == text.Length || text.Length > NumberCell.MostCharacters || !(char.IsAsciiDigit((char)text[i]) || text[i] is (byte)'.' or (byte)','))
        {
            return default;
        }

        var start = i;
        ulong mantissa = 0;
        var significant = 0;
        i = Digits(text, i, ref mantissa, ref significant);
        var wholeDigits = i - start;
        var form = NumberForm.Plain;
        var fraction = 0;
        var fractionIsZero = true;
        if (i < text.Length && text[i] is (byte)'.' or (byte)',')
        {
            form = text[i] == '.' ? NumberForm.Point : NumberForm.Comma;
            var begin = ++i;
            i = Digits(text, i, ref mantissa, ref significant);
            fraction = i - begin;
            fractionIsZero = text[begin..i].IndexOfAnyExcept((byte)'0') < 0;
        }

        if (wholeDigits + fraction == 0)
        {
            return default;
        }

        var exponent = 0;
        var mantissaEnd = i;
        if (i < text.Length && text[i] is (byte)'e' or (byte)'E' && !TryExponent(text, ref i, out exponent))
        {
            return default;
        }

        if (i < text.Length)
        {
            return IsGrouped(text[start..]) ? new CellShape(NumberForm.Grouped, 0, false, true, false) : default;
        }

        var scale = exponent - fraction;
        double value;
        if (significant <= MostDigitsOfExactValue && Math.Abs(scale) <= MostExactPowerOfTen)
        {
            // both operands are exact doubles, so that the one division or multiplication rounds once (Clinger 1990)
            value = scale < 0 ? mantissa / PowersOfTen[-scale] : mantissa * PowersOfTen[scale];
            value = text[0] == '-' ? -value : value;
        }
        else if (!TrySlowly(text, out value))
        {
            return default;
        }

        var written = mantissaEnd == text.Length;
        var whole = written ? fractionIsZero : value == Math.Floor(value);
        var groupLike = written && form != NumberForm.Plain && fraction == 3 && wholeDigits is >= 1 and <= 3 && text[start] != '0';
        return new CellShape(form, value, whole, groupLike, wholeDigits > 1 && text[start] == '0');
    }

    private static int Digits(ReadOnlySpan<byte> text, int i, ref ulong mantissa, ref int significant)
    {
        while (i < text.Length && (uint)(text[i] - '0') <= 9)
        {
            if (significant < 19)
            {
                mantissa = (mantissa * 10) + (ulong)(text[i] - '0');
            }

            significant += significant > 0 || text[i] != '0' ? 1 : 0;
            i++;
        }

        return i;
    }

    private static bool TryExponent(ReadOnlySpan<byte> text, ref int i, out int exponent)
    {
        exponent = 0;
        var at = i + 1;
        var negative = at < text.Length && text[at] == '-';
        at += at < text.Length && text[at] is (byte)'+' or (byte)'-' ? 1 : 0;
        var begin = at;
        while (at < text.Length && char.IsAsciiDigit((char)text[at]))
        {
            exponent = Math.Min(100_000, (exponent * 10) + (text[at] - '0'));
            at++;
        }

        exponent = negative ? -exponent : exponent;
        i = at;
        return at > begin;
    }

    private static bool TrySlowly(ReadOnlySpan<byte> text, out double value)
    {
        Span<byte> copy = stackalloc byte[text.Length];
        text.CopyTo(copy);
        copy.Replace((byte)',', (byte)'.');
        return double.TryParse(copy, NumberStyles.Float, CultureInfo.InvariantCulture, out value) && double.IsFinite(value);
    }

    /// <summary>Whether digits without a sign stand in groups of three, with at most one decimal part behind.</summary>
    private static bool IsGrouped(ReadOnlySpan<byte> text)
    {
        var i = 0;
        while (i < text.Length && char.IsAsciiDigit((char)text[i]))
        {
            i++;
        }

        if (i is 0 or > 3 || text[0] == '0')
        {
            return false;
        }

        var separator = SeparatorAt(text, i);
        var groups = 0;
        while (!separator.IsEmpty && text[i..].StartsWith(separator) && ThreeDigits(text[(i + separator.Length)..]))
        {
            i += separator.Length + 3;
            groups++;
        }

        if (groups == 0)
        {
            return false;
        }

        if (i < text.Length && text[i] is (byte)'.' or (byte)',' && text[i] != separator[0])
        {
            i++;
            while (i < text.Length && char.IsAsciiDigit((char)text[i]))
            {
                i++;
            }
        }

        return i == text.Length;
    }

    private static ReadOnlySpan<byte> SeparatorAt(ReadOnlySpan<byte> text, int i)
    {
        ReadOnlySpan<byte> rest = text[i..];
        if (rest.IsEmpty)
        {
            return default;
        }

        if (rest[0] is (byte)'.' or (byte)',' or (byte)' ' or (byte)'\'')
        {
            return rest[..1];
        }

        // no-break space, thin space, narrow no-break space, right single quotation mark
        return rest.StartsWith("\u00A0"u8) ? rest[..2]
            : rest.StartsWith("\u2009"u8) || rest.StartsWith("\u202F"u8) || rest.StartsWith("\u2019"u8) ? rest[..3]
            : default;
    }

    private static bool ThreeDigits(ReadOnlySpan<byte> text) =>
        text.Length >= 3 && char.IsAsciiDigit((char)text[0]) && char.IsAsciiDigit((char)text[1]) && char.IsAsciiDigit((char)text[2])
        && (text.Length == 3 || !char.IsAsciiDigit((char)text[3]));
}
