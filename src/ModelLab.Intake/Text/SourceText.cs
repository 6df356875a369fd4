namespace ModelLab.Intake.Text;

/// <summary>
/// The text of a file as a stream of UTF-8 without byte order mark, whatever its bytes were. Decides the encoding as it goes:
/// UTF-8 as long as the bytes are; Windows-1252 from the first byte on that is not, where everything before it was plain ASCII
/// (the same in both, so nothing has to be read again). Bytes that fit neither end the text with a <see cref="Fault"/>.
/// </summary>
internal sealed class SourceText : Stream
{
    internal const string Utf8Name = "utf-8";
    internal const string Windows1252Name = "windows-1252";
    private const int BlockBytes = 1 << 16;

    private readonly Stream source;
    private readonly bool encodingGiven;
    private readonly byte[] raw = new byte[BlockBytes];
    private byte[] transcoded = [];
    private int rawStart;
    private int rawEnd;
    private bool sourceEnded;
    private bool nonAsciiSeen;
    private ReadOnlyMemory<byte> ready;
    private ReadOnlyMemory<byte> head;

    /// <summary>Looks at the first bytes of a file.</summary>
    /// <param name="source">The file, read forward only; not disposed.</param>
    /// <param name="encoding">Its encoding where known, else null.</param>
    /// <exception cref="IntakeRefusedException">The file is no text table, or the encoding is unknown to the program.</exception>
    internal SourceText(Stream source, string? encoding)
    {
        this.source = source;
        encodingGiven = encoding is not null;
        Encoding = encoding?.ToLowerInvariant() switch
        {
            null or Utf8Name or "utf8" => Utf8Name,
            Windows1252Name or "cp1252" => Windows1252Name,
            _ => throw Refused($"The encoding '{encoding}' is not read. Save the file as UTF-8 (or Windows-1252) and upload that."),
        };
        while (rawEnd < FileSignature.Length && !sourceEnded)
        {
            ReadRaw();
        }

        var first = raw.AsSpan(0, rawEnd);
        if (FileSignature.Refusal(first) is { } refusal)
        {
            throw Refused(refusal);
        }

        if (first.StartsWith<byte>([0xEF, 0xBB, 0xBF]))
        {
            if (Encoding != Utf8Name)
            {
                throw Refused("The file begins with the byte order mark of UTF-8 but is said to be Windows-1252. Leave the encoding to the program.");
            }

            ByteOrderMark = true;
            encodingGiven = true;
            rawStart = 3;
        }
    }

    /// <summary><see cref="Utf8Name"/> or <see cref="Windows1252Name"/>; final once the text has been read to its end.</summary>
    internal string Encoding { get; private set; }

    /// <summary>Whether a byte order mark stood before the text.</summary>
    internal bool ByteOrderMark { get; }

    /// <summary>Why the text ends where it does, or null where the file ends there.</summary>
    internal TextFault? Fault { get; private set; }

    /// <summary>Bytes of UTF-8 handed out so far.</summary>
    internal long Delivered { get; private set; }

    /// <inheritdoc/>
    public override bool CanRead => true;

    /// <inheritdoc/>
    public override bool CanSeek => false;

    /// <inheritdoc/>
    public override bool CanWrite => false;

    /// <inheritdoc/>
    public override long Length => throw new NotSupportedException();

    /// <inheritdoc/>
    public override long Position { get => Delivered; set => throw new NotSupportedException(); }

    /// <summary>The first bytes of the text, at most <paramref name="count"/>, without taking them. To be called once, before reading.</summary>
    /// <param name="count">How many.</param>
    /// <param name="complete">Whether that is the whole text.</param>
    internal ReadOnlyMemory<byte> Peek(int count, out bool complete)
    {
        var buffer = new byte[BlockBytes];
        var length = 0;
        complete = false;
        while (length < count)
        {
            if (ready.IsEmpty && !Advance())
            {
                complete = true;
                break;
            }

            var part = ready[..Math.Min(count - length, ready.Length)];
            if (length + part.Length > buffer.Length)
            {
                Array.Resize(ref buffer, Math.Min(count, Math.Max(buffer.Length * 2, length + part.Length)));
            }

            part.CopyTo(buffer.AsMemory(length));
            length += part.Length;
            ready = ready[part.Length..];
        }

        head = buffer.AsMemory(0, length);
        return head;
    }

    /// <inheritdoc/>
    public override int Read(Span<byte> buffer)
    {
        if (buffer.IsEmpty)
        {
            return 0;
        }

        ref var from = ref ready;
        if (!head.IsEmpty)
        {
            from = ref head;
        }
        else if (ready.IsEmpty && !Advance())
        {
            return 0;
        }

        var count = Math.Min(buffer.Length, from.Length);
        from.Span[..count].CopyTo(buffer);
        from = from[count..];
        Delivered += count;
        return count;
    }

    /// <inheritdoc/>
    public override int Read(byte[] buffer, int offset, int count) => Read(buffer.AsSpan(offset, count));

    /// <inheritdoc/>
    public override void Flush()
    {
    }

    /// <inheritdoc/>
    public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

    /// <inheritdoc/>
    public override void SetLength(long value) => throw new NotSupportedException();

    /// <inheritdoc/>
    public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();

    private static IntakeRefusedException Refused(string message) => new(message, [new IntakeProblem(null, null, message)]);

    private void ReadRaw()
    {
        var count = source.Read(raw, rawEnd, raw.Length - rawEnd);
        rawEnd += count;
        sourceEnded = count == 0;
    }

    /// <summary>Makes at least one byte ready; false at the end.</summary>
    private bool Advance()
    {
        while (Fault is null)
        {
            if (rawStart > 0)
            {
                raw.AsSpan(rawStart, rawEnd - rawStart).CopyTo(raw);
                rawEnd -= rawStart;
                rawStart = 0;
            }

            if (!sourceEnded && rawEnd < raw.Length)
            {
                ReadRaw();
            }

            if (rawEnd == 0)
            {
                if (sourceEnded)
                {
                    return false;
                }

                continue;
            }

            Decode();
            if (!ready.IsEmpty)
            {
                return true;
            }
        }

        return false;
    }

    private void Decode()
    {
        var block = raw.AsSpan(0, rawEnd);
        var nul = block.IndexOf((byte)0);
        var text = nul < 0 ? block : block[..nul];
        var taken = Encoding == Utf8Name ? DecodeUtf8(text, last: sourceEnded || nul >= 0) : DecodeWindows1252(text);
        rawStart = taken;
        if (nul >= 0 && taken == nul && Fault is null)
        {
            Fault = new TextFault("A NUL byte stands here: the file is binary, damaged, or written in UTF-16. Save the table again as CSV (UTF-8) and upload that.");
        }
    }

    private int DecodeUtf8(ReadOnlySpan<byte> text, bool last)
    {
        var valid = Utf8Prefix.Measure(text, out var incomplete);
        var waiting = incomplete && !last;
        nonAsciiSeen |= !System.Text.Ascii.IsValid(text[..valid]);
        if (valid < text.Length && !waiting)
        {
            if (!encodingGiven && !nonAsciiSeen)
            {
                Encoding = Windows1252Name;
                return DecodeWindows1252(text);
            }

            Fault = new TextFault("A byte here is not valid UTF-8, though the text before it is: the file is damaged, cut off, or put together from parts in different encodings. Save it again as UTF-8, or state its encoding.");
        }

        ready = raw.AsMemory(0, valid);
        return valid;
    }

    private int DecodeWindows1252(ReadOnlySpan<byte> text)
    {
        if (transcoded.Length == 0)
        {
            transcoded = new byte[BlockBytes * Windows1252.MaxExpansion];
        }

        var taken = Windows1252.Transcode(text, transcoded, out var written);
        ready = transcoded.AsMemory(0, written);
        if (taken < text.Length)
        {
            Fault = new TextFault($"The byte {text[taken]:X2} here is a character neither in UTF-8 nor in Windows-1252. Save the file again as UTF-8 and upload that.");
        }

        return taken;
    }
}
