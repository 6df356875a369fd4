using ModelLab.Statistics.Numerics;

namespace ModelLab.Intake.Csv.Reading;

/// <summary>
/// Reads a cell as a number as written. Spaces around it are left out, and a decimal mark without digits behind it (5.) is passed over;
/// the rest is <see cref="DecimalReader"/>'s.
/// </summary>
internal static class NumberCell
{
    /// <summary>Longest text that is tried as a number.</summary>
    internal const int MostCharacters = DecimalReader.MaximumLength;

    /// <summary>Reads value and remainder; false where the cell is no finite number.</summary>
    internal static bool TryRead(ReadOnlySpan<byte> cell, char decimalMark, out double value, out double remainder)
    {
        value = remainder = 0;
        var text = CellText.Trim(cell);
        if (text.Length is 0 or > MostCharacters)
        {
            return false;
        }

        var mark = text.IndexOf((byte)decimalMark);
        var passedOver = mark > 0 && IsDigit(text[mark - 1]) && (mark + 1 == text.Length || !IsDigit(text[mark + 1]))
            && text[..mark].IndexOfAny((byte)'e', (byte)'E') < 0 ? mark : -1;
        Span<char> characters = stackalloc char[text.Length];
        var length = 0;
        for (var i = 0; i < text.Length; i++)
        {
            if (i != passedOver)
            {
                characters[length++] = (char)text[i];
            }
        }

        // a second mark stays a second mark: it must not become the first
        return (passedOver < 0 || text[(passedOver + 1)..].IndexOf((byte)decimalMark) < 0)
            && DecimalReader.TryRead(characters[..length], decimalMark, out value, out remainder);
    }

    private static bool IsDigit(byte value) => char.IsAsciiDigit((char)value);
}
