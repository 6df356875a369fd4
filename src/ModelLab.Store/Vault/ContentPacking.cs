using System.Buffers;
using System.Buffers.Binary;
using System.IO.Compression;

namespace ModelLab.Store.Vault;

/// <summary>Content made smaller before it is encrypted: a byte for the method, four for the length, then the content.</summary>
internal static class ContentPacking
{
    private const byte AsItIs = 0;
    private const byte Brotli = 1;
    private const int HeaderLength = 5;

    // The quickest setting: tables of figures shrink to a third at more than the speed of a disk.
    private const int Quality = 1;
    private const int Window = 22;

    /// <summary>Packs; content that does not become smaller stays as it is.</summary>
    public static byte[] Pack(ReadOnlySpan<byte> content)
    {
        var buffer = ArrayPool<byte>.Shared.Rent(HeaderLength + BrotliEncoder.GetMaxCompressedLength(content.Length));
        try
        {
            var method = Brotli;
            if (!BrotliEncoder.TryCompress(content, buffer.AsSpan(HeaderLength), out var length, Quality, Window) || length >= content.Length)
            {
                method = AsItIs;
                length = content.Length;
                content.CopyTo(buffer.AsSpan(HeaderLength));
            }

            buffer[0] = method;
            BinaryPrimitives.WriteInt32BigEndian(buffer.AsSpan(1), content.Length);
            return buffer.AsSpan(0, HeaderLength + length).ToArray();
        }
        finally
        {
            ArrayPool<byte>.Shared.Return(buffer, clearArray: true);
        }
    }

    /// <summary>Unpacks what <see cref="Pack"/> gave.</summary>
    /// <exception cref="InvalidDataException">It is something else.</exception>
    public static byte[] Unpack(ReadOnlySpan<byte> packed)
    {
        if (packed.Length < HeaderLength)
        {
            throw new InvalidDataException("Packed content is cut.");
        }

        var length = BinaryPrimitives.ReadInt32BigEndian(packed[1..]);
        var body = packed[HeaderLength..];
        switch (packed[0])
        {
            case AsItIs when body.Length == length:
                return body.ToArray();
            case Brotli when length >= 0:
                var content = new byte[length];
                return BrotliDecoder.TryDecompress(body, content, out var written) && written == length
                    ? content
                    : throw new InvalidDataException("Packed content does not unpack to its length.");
            default:
                throw new InvalidDataException("Packed content has a form that this program does not know.");
        }
    }
}
