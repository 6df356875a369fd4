using System.Text;
using ModelLab.Intake.Csv.Reading;

namespace ModelLab.Intake.Csv;

/// <summary>
/// Texts that are taken as missing without asking, and told: the empty cell and the usual words and signs (common practice).
/// Numbers that stand for missing (-99, 999) are never taken so; see <see cref="Proposals.MissingCodeSuspicion"/>.
/// </summary>
internal static class MissingTexts
{
    private static readonly byte[][] Texts =
        [.. new[] { ".", "-", "?", "NA", "na", "N/A", "n/a", "NaN", "nan", "null", "NULL", "Null" }.Select(Encoding.UTF8.GetBytes)];

    /// <summary>Whether a cell, spaces around it left out, is missing.</summary>
    internal static bool IsMissing(ReadOnlySpan<byte> cell) => IsMissingTrimmed(CellText.Trim(cell));

    /// <summary>Whether a cell without spaces around it is missing.</summary>
    internal static bool IsMissingTrimmed(ReadOnlySpan<byte> text)
    {
        if (text.Length is 0 or > 4)
        {
            return text.Length == 0;
        }

        if (char.IsAsciiDigit((char)text[0]))
        {
            return false;
        }

        foreach (var missing in Texts)
        {
            if (text.SequenceEqual(missing))
            {
                return true;
            }
        }

        return false;
    }
}
