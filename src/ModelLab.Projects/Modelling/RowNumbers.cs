namespace ModelLab.Projects.Modelling;

/// <summary>
/// Row numbers as bytes: the steps from one to the next (from 0, numbers counted from 1), each as a base-128 number, low
/// digits first (LEB128, as in the DWARF standard, version 4, section 7.6).
/// </summary>
public static class RowNumbers
{
    /// <summary>Writes zero-based ascending rows.</summary>
    public static byte[] Write(ReadOnlySpan<int> rows)
    {
        var bytes = new List<byte>(rows.Length + 8);
        var before = -1;
        foreach (var row in rows)
        {
            var step = (uint)(row - before);
            before = row;
            while (step >= 0x80)
            {
                bytes.Add((byte)(step | 0x80));
                step >>= 7;
            }

            bytes.Add((byte)step);
        }

        return [.. bytes];
    }

    /// <summary>Reads what <see cref="Write"/> wrote.</summary>
    /// <exception cref="FormatException">The bytes end within a number.</exception>
    public static int[] Read(ReadOnlySpan<byte> bytes)
    {
        var rows = new List<int>(bytes.Length);
        var before = -1;
        var step = 0u;
        var shift = 0;
        foreach (var b in bytes)
        {
            step |= (uint)(b & 0x7F) << shift;
            shift += 7;
            if (b < 0x80)
            {
                before += (int)step;
                rows.Add(before);
                step = 0;
                shift = 0;
            }
        }

        return shift == 0 ? [.. rows] : throw new FormatException("The list of row numbers ends within a number.");
    }
}
