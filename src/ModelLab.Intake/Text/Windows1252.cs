using System.Text;

namespace ModelLab.Intake.Text;

/// <summary>Turns Windows-1252 bytes into UTF-8. The five bytes without a character (81, 8D, 8F, 90, 9D) are told, not guessed.</summary>
internal static class Windows1252
{
    /// <summary>Most UTF-8 bytes that one byte becomes.</summary>
    internal const int MaxExpansion = 3;

    private static readonly byte[][] Utf8 = BuildTable();

    /// <summary>Transcodes until the end or the first byte without a character.</summary>
    /// <param name="source">Windows-1252 bytes.</param>
    /// <param name="destination">At least <see cref="MaxExpansion"/> times as long.</param>
    /// <param name="written">UTF-8 bytes written.</param>
    /// <returns>Bytes of <paramref name="source"/> that were read; fewer than its length where an undefined byte stands.</returns>
    internal static int Transcode(ReadOnlySpan<byte> source, Span<byte> destination, out int written)
    {
        written = 0;
        for (var i = 0; i < source.Length; i++)
        {
            var value = source[i];
            if (value < 0x80)
            {
                destination[written++] = value;
                continue;
            }

            var sequence = Utf8[value - 0x80];
            if (sequence.Length == 0)
            {
                return i;
            }

            sequence.CopyTo(destination[written..]);
            written += sequence.Length;
        }

        return source.Length;
    }

    private static byte[][] BuildTable()
    {
        var encoding = CodePagesEncodingProvider.Instance.GetEncoding(1252)
            ?? throw new NotSupportedException("The framework does not know Windows-1252.");
        var table = new byte[128][];
        for (var i = 0; i < table.Length; i++)
        {
            var value = (byte)(0x80 + i);
            table[i] = value is 0x81 or 0x8D or 0x8F or 0x90 or 0x9D ? [] : Encoding.UTF8.GetBytes(encoding.GetString([value]));
        }

        return table;
    }
}
