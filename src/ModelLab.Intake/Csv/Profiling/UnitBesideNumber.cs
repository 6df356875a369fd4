using ModelLab.Intake.Csv.Reading;

namespace ModelLab.Intake.Csv.Profiling;

/// <summary>Recognises numbers with a currency or per cent sign or a short unit, such as 12 %, €5 or 5.2 kg.</summary>
internal static class UnitBesideNumber
{
    private const int LongestUnit = 4;

    /// <summary>Whether a trimmed cell is a number with something short at one end.</summary>
    internal static bool Is(ReadOnlySpan<byte> text)
    {
        var firstDigit = text.IndexOfAnyInRange((byte)'0', (byte)'9');
        if (firstDigit < 0)
        {
            return false;
        }

        var afterDigits = text.LastIndexOfAnyInRange((byte)'0', (byte)'9') + 1;
        if (afterDigits == text.Length)
        {
            return firstDigit is > 0 and <= LongestUnit && !HasLetters(text[..firstDigit]) && CellShape.Of(text[firstDigit..]).IsNumber;
        }

        return firstDigit <= 1 && text.Length - afterDigits <= LongestUnit && CellShape.Of(text[..afterDigits]).IsNumber;
    }

    // a letter before digits is a code (A12), a sign is a currency
    private static bool HasLetters(ReadOnlySpan<byte> text)
    {
        foreach (var c in text)
        {
            if (char.IsAsciiLetter((char)c) || c is (byte)'#' or (byte)'_')
            {
                return true;
            }
        }

        return false;
    }
}
