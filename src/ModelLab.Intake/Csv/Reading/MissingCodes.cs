using System.Text;

namespace ModelLab.Intake.Csv.Reading;

/// <summary>The texts that mean missing in one column, besides the empty cell.</summary>
internal sealed class MissingCodes(IReadOnlyList<string> codes)
{
    private readonly byte[][] texts = [.. codes.Select(c => CellText.Trim(Encoding.UTF8.GetBytes(c)).ToArray()).Where(t => t.Length > 0)];

    /// <summary>Whether a cell is empty or one of the texts, spaces around it left out.</summary>
    internal bool Contains(ReadOnlySpan<byte> cell)
    {
        var text = CellText.Trim(cell);
        if (text.IsEmpty)
        {
            return true;
        }

        foreach (var code in texts)
        {
            if (text.SequenceEqual(code))
            {
                return true;
            }
        }

        return false;
    }

    /// <summary>The codes that are numbers under a decimal mark.</summary>
    internal IEnumerable<(double Value, double Remainder)> Numbers(char decimalMark)
    {
        foreach (var text in texts)
        {
            if (NumberCell.TryRead(text, decimalMark, out var value, out var remainder))
            {
                yield return (value, remainder);
            }
        }
    }
}
