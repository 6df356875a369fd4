namespace ModelLab.Intake.Csv.Reading;

/// <summary>Spaces around a cell. RFC 4180 (section 2, rule 4) keeps them as part of a text; a number, date or missing code is read without them.</summary>
internal static class CellText
{
    /// <summary>The cell without spaces, tabs, line breaks and no-break spaces (C2 A0) at its ends.</summary>
    internal static ReadOnlySpan<byte> Trim(ReadOnlySpan<byte> cell)
    {
        if (cell.IsEmpty || (IsInner(cell[0]) && IsInner(cell[^1])))
        {
            return cell;
        }

        while (!cell.IsEmpty)
        {
            if (cell[0] is (byte)' ' or (byte)'\t' or (byte)'\r' or (byte)'\n')
            {
                cell = cell[1..];
            }
            else if (cell.StartsWith<byte>([0xC2, 0xA0]))
            {
                cell = cell[2..];
            }
            else
            {
                break;
            }
        }

        while (!cell.IsEmpty)
        {
            if (cell[^1] is (byte)' ' or (byte)'\t' or (byte)'\r' or (byte)'\n')
            {
                cell = cell[..^1];
            }
            else if (cell.EndsWith<byte>([0xC2, 0xA0]))
            {
                cell = cell[..^2];
            }
            else
            {
                break;
            }
        }

        return cell;
    }

    private static bool IsInner(byte value) => value is > (byte)' ' and < 0x80;
}
