using System.Buffers;
using System.Text;
using System.Text.Unicode;

namespace ModelLab.Intake.Text;

/// <summary>How far bytes are well-formed UTF-8 (Unicode Standard, table 3-7).</summary>
internal static class Utf8Prefix
{
    /// <summary>Length of the well-formed beginning.</summary>
    /// <param name="bytes">Bytes that start at a character.</param>
    /// <param name="incomplete">True where the rest is only the beginning of a character.</param>
    internal static int Measure(ReadOnlySpan<byte> bytes, out bool incomplete)
    {
        incomplete = false;
        if (Utf8.IsValid(bytes))
        {
            return bytes.Length;
        }

        var position = 0;
        while (position < bytes.Length)
        {
            var run = bytes[position..].IndexOfAnyExceptInRange((byte)0, (byte)0x7F);
            if (run < 0)
            {
                return bytes.Length;
            }

            position += run;
            var status = Rune.DecodeFromUtf8(bytes[position..], out _, out var consumed);
            if (status != OperationStatus.Done)
            {
                incomplete = status == OperationStatus.NeedMoreData;
                return position;
            }

            position += consumed;
        }

        return position;
    }
}
