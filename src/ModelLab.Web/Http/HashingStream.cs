using System.Security.Cryptography;
using System.Text;

namespace ModelLab.Web.Http;

/// <summary>A part of an upload on its way through: hashed, counted, and refused above a limit.</summary>
internal sealed class HashingStream(Stream inner, string name, string? fileName, long maximumBytes) : Stream
{
    private readonly IncrementalHash hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
    private long count;

    public override bool CanRead => true;

    public override bool CanSeek => false;

    public override bool CanWrite => false;

    public override long Length => throw new NotSupportedException();

    public override long Position
    {
        get => count;
        set => throw new NotSupportedException();
    }

    /// <summary>The part's line in the hash of the whole body; the name of the file counts, for it is recorded with the file.</summary>
    public string Finish() => $"{Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(fileName is null ? name : $"{name}\n{fileName}")))} {Convert.ToHexStringLower(hash.GetHashAndReset())}";

    public override int Read(byte[] buffer, int offset, int count) => Read(buffer.AsSpan(offset, count));

    public override int Read(Span<byte> buffer)
    {
        // The network below is read asynchronously only; a synchronous reader waits for it.
        var rented = System.Buffers.ArrayPool<byte>.Shared.Rent(Math.Min(buffer.Length, 1 << 16));
        try
        {
            var read = ReadAsync(rented.AsMemory(0, Math.Min(rented.Length, buffer.Length)), CancellationToken.None).AsTask().GetAwaiter().GetResult();
            rented.AsSpan(0, read).CopyTo(buffer);
            return read;
        }
        finally
        {
            System.Buffers.ArrayPool<byte>.Shared.Return(rented);
        }
    }

    public override Task<int> ReadAsync(byte[] buffer, int offset, int count, CancellationToken cancellationToken) =>
        ReadAsync(buffer.AsMemory(offset, count), cancellationToken).AsTask();

    public override async ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellationToken = default)
    {
        int read;
        try
        {
            read = await inner.ReadAsync(buffer, cancellationToken);
        }
        catch (IOException e) when (e is not BadHttpRequestException && e.Message.Contains("Unexpected end", StringComparison.Ordinal))
        {
            throw new InvalidDataException("The body breaks off before its closing boundary.", e);
        }

        hash.AppendData(buffer.Span[..read]);
        count += read;
        return count > maximumBytes
            ? throw new BadHttpRequestException($"The part '{name}' is too large.", StatusCodes.Status413PayloadTooLarge)
            : read;
    }

    public override void Flush()
    {
    }

    public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

    public override void SetLength(long value) => throw new NotSupportedException();

    public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();

    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            hash.Dispose();
        }

        base.Dispose(disposing);
    }
}
