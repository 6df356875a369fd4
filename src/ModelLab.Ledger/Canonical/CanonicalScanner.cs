using System.Buffers;
using System.Globalization;
using System.Text;
using System.Text.Unicode;

namespace ModelLab.Ledger.Canonical;

/// <summary>
/// Walks over JSON bytes and refuses, at the byte where it shows, whatever canonical form (RFC 8785) would have written
/// otherwise: blanks, needless escapes, a number's other spellings, keys out of order or twice, bad UTF-8. What it
/// accepts is byte for byte what serialising the same value gives.
/// </summary>
internal ref struct CanonicalScanner(ReadOnlySpan<byte> bytes)
{
    private static readonly SearchValues<byte> StringStops =
        SearchValues.Create([.. Enumerable.Range(0, 0x20).Select(c => (byte)c), (byte)'"', (byte)'\\']);

    private static readonly SearchValues<byte> NumberBytes = SearchValues.Create("+-.0123456789eE"u8);

    private readonly ReadOnlySpan<byte> bytes = bytes;

    /// <summary>Offset of the next byte.</summary>
    public int Position { get; private set; }

    private readonly bool AtEnd => Position >= bytes.Length;

    /// <summary>Takes exactly this text.</summary>
    public void Expect(ReadOnlySpan<byte> text)
    {
        if (!TryTake(text))
        {
            throw Fault($"{Encoding.ASCII.GetString(text)} should stand here");
        }
    }

    /// <summary>Takes this text if it comes next.</summary>
    public bool TryTake(ReadOnlySpan<byte> text)
    {
        if (!bytes[Position..].StartsWith(text))
        {
            return false;
        }

        Position += text.Length;
        return true;
    }

    /// <summary>Nothing may follow.</summary>
    public readonly void ExpectEnd()
    {
        if (!AtEnd)
        {
            throw Fault("nothing should follow here");
        }
    }

    /// <summary>Takes any value.</summary>
    /// <param name="depth">Objects and arrays around it.</param>
    public void Value(int depth)
    {
        switch (AtEnd ? (byte)0 : bytes[Position])
        {
            case (byte)'{':
                Object(depth + 1);
                break;
            case (byte)'[':
                Array(depth + 1);
                break;
            case (byte)'"':
                RawString();
                break;
            case (byte)'t':
                Expect("true"u8);
                break;
            case (byte)'f':
                Expect("false"u8);
                break;
            case (byte)'n':
                Expect("null"u8);
                break;
            default:
                RawNumber();
                break;
        }
    }

    /// <summary>Takes an object.</summary>
    /// <param name="depth">Objects and arrays around it, itself counted.</param>
    public void Object(int depth)
    {
        CheckDepth(depth);
        Expect("{"u8);
        if (TryTake("}"u8))
        {
            return;
        }

        ReadOnlySpan<byte> before = default;
        var first = true;
        while (true)
        {
            var start = Position;
            var key = RawString();
            if (!first && CompareKeys(before, key) is var order and >= 0)
            {
                Position = start;
                throw Fault(order == 0 ? "this key stands twice in one object" : "this key is out of canonical order");
            }

            before = key;
            first = false;
            Expect(":"u8);
            Value(depth);
            if (TryTake("}"u8))
            {
                return;
            }

            Expect(","u8);
        }
    }

    /// <summary>Takes a string and gives its text.</summary>
    public string String() => CanonicalString.Decode(RawString());

    /// <summary>Takes a number and gives it.</summary>
    public double Number() => double.Parse(RawNumber(), NumberStyles.Float, CultureInfo.InvariantCulture);

    private void Array(int depth)
    {
        CheckDepth(depth);
        Expect("["u8);
        if (TryTake("]"u8))
        {
            return;
        }

        while (true)
        {
            Value(depth);
            if (TryTake("]"u8))
            {
                return;
            }

            Expect(","u8);
        }
    }

    /// <summary>Takes a string; gives the bytes between the quotes, escapes left in.</summary>
    private ReadOnlySpan<byte> RawString()
    {
        Expect("\""u8);
        var start = Position;
        while (true)
        {
            var stop = bytes[Position..].IndexOfAny(StringStops);
            if (stop < 0)
            {
                Position = bytes.Length;
                throw Fault("the text breaks off within a string");
            }

            Position += stop;
            if (bytes[Position] == '"')
            {
                break;
            }

            if (bytes[Position] != '\\')
            {
                throw Fault("a control character must be escaped");
            }

            Escape();
        }

        var raw = bytes[start..Position];
        if (!Utf8.IsValid(raw))
        {
            Position = start;
            throw Fault("this string is not UTF-8");
        }

        Position++;
        return raw;
    }

    private void Escape()
    {
        var letter = Position + 1 < bytes.Length ? bytes[Position + 1] : (byte)0;
        if (CanonicalString.Unescape(letter) != 0)
        {
            Position += 2;
            return;
        }

        if (!CanonicalString.EscapedControl(bytes[Position..], out var control) || control is 8 or 9 or 10 or 12 or 13)
        {
            throw Fault("canonical form does not escape in this way");
        }

        Position += 6;
    }

    private ReadOnlySpan<byte> RawNumber()
    {
        var rest = bytes[Position..];
        var length = rest.IndexOfAnyExcept(NumberBytes);
        var raw = length < 0 ? rest : rest[..length];
        if (raw.IsEmpty)
        {
            throw Fault(rest.IsEmpty ? "the text breaks off here" : "no JSON value begins in this way");
        }

        if (!IsShortInteger(raw) && !IsCanonicalNumber(raw))
        {
            throw Fault("this number is not in canonical form");
        }

        Position += raw.Length;
        return raw;
    }

    /// <summary>The common case, seen without arithmetic: up to 15 digits, no sign, no leading zero.</summary>
    private static bool IsShortInteger(ReadOnlySpan<byte> raw) =>
        raw.Length <= 15 && (raw[0] != '0' || raw.Length == 1) && !raw.ContainsAnyExceptInRange((byte)'0', (byte)'9');

    private static bool IsCanonicalNumber(ReadOnlySpan<byte> raw)
    {
        if (raw.Length > CanonicalNumber.MaximumLength
            || !double.TryParse(raw, NumberStyles.Float, CultureInfo.InvariantCulture, out var value)
            || !double.IsFinite(value))
        {
            return false;
        }

        Span<byte> text = stackalloc byte[CanonicalNumber.MaximumLength];
        return raw.SequenceEqual(text[..CanonicalNumber.Write(value, text)]);
    }

    /// <summary>Order by UTF-16 code units (RFC 8785 section 3.2.3), which differs from that of UTF-8 bytes.</summary>
    private static int CompareKeys(ReadOnlySpan<byte> left, ReadOnlySpan<byte> right) =>
        IsPlain(left) && IsPlain(right)
            ? left.SequenceCompareTo(right)
            : string.CompareOrdinal(CanonicalString.Decode(left), CanonicalString.Decode(right));

    private static bool IsPlain(ReadOnlySpan<byte> raw) => Ascii.IsValid(raw) && !raw.Contains((byte)'\\');

    private readonly void CheckDepth(int depth)
    {
        if (depth > CanonicalJson.MaximumDepth)
        {
            throw Fault($"objects and arrays stand more than {CanonicalJson.MaximumDepth} deep in each other");
        }
    }

    private readonly CanonicalFormException Fault(string problem) => new(Position, problem);
}
