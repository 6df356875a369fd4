using ModelLab.Statistics.Numerics;

namespace ModelLab.Intake.Csv.Reading;

/// <summary>
/// Reads a cell as a number as written. Spaces around it are left out, and a number that begins or ends with its decimal mark
/// (.5, 5.) gets the zero that is meant; the rest is <see cref="DecimalReader"/>'s.
/// </summary>
internal static class NumberCell
{
    /// <summary>Longest text that is tried as a number.</summary>
    internal const int MostCharacters = 1024;

    /// <summary>Reads value and remainder; false where the cell is no finite number.</summary>
    internal static bool TryRead(ReadOnlySpan<byte> cell, char decimalMark, out double value, out double remainder)
    {
        value = remainder = 0;
        var text = CellText.Trim(cell);
        if (text.Length is 0 or > MostCharacters || text.Count((byte)decimalMark) > 1)
        {
            return false;
        }

        Span<char> characters = stackalloc char[text.Length + 1];
        var length = 0;
        for (var i = 0; i < text.Length; i++)
        {
            var c = (char)text[i];
            if (c == decimalMark)
            {
                var digitBefore = i > 0 && char.IsAsciiDigit((char)text[i - 1]);
                var digitAfter = i + 1 < text.Length && char.IsAsciiDigit((char)text[i + 1]);
                if (digitBefore && !digitAfter)
                {
                    continue;
                }

                if (digitAfter && !digitBefore)
                {
                    characters[length++] = '0';
                }
            }

            characters[length++] = c;
        }

        return DecimalReader.TryRead(characters[..length], decimalMark, out value, out remainder);
    }
}
