using System.Buffers;
using System.Text;

namespace ModelLab.Ledger.Canonical;

/// <summary>
/// Strings in canonical JSON (RFC 8785 section 3.2.2.2): as they are in UTF-8, escaped only where JSON demands it, and
/// then by the short form where one exists. Text is not normalised. Lone surrogates are refused.
/// </summary>
internal static class CanonicalString
{
    private static readonly SearchValues<char> Escaped =
        SearchValues.Create([.. Enumerable.Range(0, 0x20).Select(c => (char)c), '"', '\\']);

    /// <summary>Appends the quoted form.</summary>
    /// <exception cref="ArgumentException">A lone surrogate.</exception>
    public static void Write(ReadOnlySpan<char> text, IBufferWriter<byte> to)
    {
        to.Write("\""u8);
        while (true)
        {
            var stop = text.IndexOfAny(Escaped);
            WritePlain(stop < 0 ? text : text[..stop], to);
            if (stop < 0)
            {
                break;
            }

            WriteEscape(text[stop], to);
            text = text[(stop + 1)..];
        }

        to.Write("\""u8);
    }

    /// <summary>What may follow a backslash beside <c>u</c>, and the byte it stands for; 0 for none.</summary>
    public static byte Unescape(byte letter) => letter switch
    {
        (byte)'"' => (byte)'"',
        (byte)'\\' => (byte)'\\',
        (byte)'b' => (byte)'\b',
        (byte)'t' => (byte)'\t',
        (byte)'n' => (byte)'\n',
        (byte)'f' => (byte)'\f',
        (byte)'r' => (byte)'\r',
        _ => 0,
    };

    /// <summary>Whether bytes begin with the escape of a control character by its number, <c>\u00xx</c> in lower case.</summary>
    public static bool EscapedControl(ReadOnlySpan<byte> escape, out byte control)
    {
        control = 0;
        if (escape.Length < 6 || !escape.StartsWith("\\u00"u8) || escape[4] is not ((byte)'0' or (byte)'1'))
        {
            return false;
        }

        var low = "0123456789abcdef"u8.IndexOf(escape[5]);
        control = (byte)(((escape[4] - '0') << 4) | (low & 15));
        return low >= 0;
    }

    /// <summary>The text of the bytes between two quotes, which have been seen to be canonical.</summary>
    public static string Decode(ReadOnlySpan<byte> raw)
    {
        if (!raw.Contains((byte)'\\'))
        {
            return Encoding.UTF8.GetString(raw);
        }

        var plain = new byte[raw.Length];
        var count = 0;
        for (var i = 0; i < raw.Length; i++)
        {
            if (raw[i] != '\\')
            {
                plain[count++] = raw[i];
            }
            else if (EscapedControl(raw[i..], out var control))
            {
                plain[count++] = control;
                i += 5;
            }
            else
            {
                plain[count++] = Unescape(raw[++i]);
            }
        }

        return Encoding.UTF8.GetString(plain.AsSpan(0, count));
    }

    private static void WritePlain(ReadOnlySpan<char> text, IBufferWriter<byte> to)
    {
        if (text.IsEmpty)
        {
            return;
        }

        var room = to.GetSpan(Encoding.UTF8.GetMaxByteCount(text.Length));
        var status = System.Text.Unicode.Utf8.FromUtf16(text, room, out _, out var written, replaceInvalidSequences: false);
        if (status != OperationStatus.Done)
        {
            throw new ArgumentException("Text holds half of a surrogate pair, which no Unicode text may hold; remove the character.");
        }

        to.Advance(written);
    }

    private static void WriteEscape(char c, IBufferWriter<byte> to)
    {
        ReadOnlySpan<byte> form = c switch
        {
            '"' => "\\\""u8,
            '\\' => "\\\\"u8,
            '\b' => "\\b"u8,
            '\t' => "\\t"u8,
            '\n' => "\\n"u8,
            '\f' => "\\f"u8,
            '\r' => "\\r"u8,
            _ => [],
        };
        if (form.IsEmpty)
        {
            to.Write("\\u00"u8);
            Span<byte> digits = [Hex(c >> 4), Hex(c & 15)];
            to.Write(digits);
        }

        to.Write(form);
    }
    private static byte Hex(int digit) => (byte)"0123456789abcdef"[digit];
}
