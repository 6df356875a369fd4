using Microsoft.EntityFrameworkCore;
using ModelLab.Store.Keys;

namespace ModelLab.Store.Vault;

/// <summary>Reads a source from its beginning to its end, one chunk in memory at a time. The end is checked too.</summary>
internal sealed class SourceStream(IDbContextFactory<ModelLabContext> contexts, SourceRow source, SourceKey key) : Stream
{
    private byte[] chunk = [];
    private int place;
    private int next;
    private long given;

    public override bool CanRead => true;

    public override bool CanSeek => false;

    public override bool CanWrite => false;

    public override long Length => throw new NotSupportedException();

    public override long Position
    {
        get => given;
        set => throw new NotSupportedException();
    }

    public override int Read(Span<byte> buffer)
    {
        while (place == chunk.Length && next < source.Chunks)
        {
            using var context = contexts.CreateDbContext();
            Take(Ciphertext(context).SingleOrDefault());
        }

        return Give(buffer);
    }

    public override async ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellationToken = default)
    {
        while (place == chunk.Length && next < source.Chunks)
        {
            await using var context = await contexts.CreateDbContextAsync(cancellationToken);
            Take(await Ciphertext(context).SingleOrDefaultAsync(cancellationToken));
        }

        return Give(buffer.Span);
    }

    public override int Read(byte[] buffer, int offset, int count) => Read(buffer.AsSpan(offset, count));

    public override Task<int> ReadAsync(byte[] buffer, int offset, int count, CancellationToken cancellationToken) =>
        ReadAsync(buffer.AsMemory(offset, count), cancellationToken).AsTask();

    public override void Flush()
    {
    }

    public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

    public override void SetLength(long value) => throw new NotSupportedException();

    public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();

    private IQueryable<byte[]> Ciphertext(ModelLabContext context)
    {
        var index = next;
        return context.SourceChunks.AsNoTracking()
            .Where(c => c.ProjectId == source.ProjectId && c.SourceId == source.SourceId && c.Index == index)
            .Select(c => c.Ciphertext);
    }

    private void Take(byte[]? ciphertext)
    {
        if (ciphertext is null)
        {
            throw new VaultDamagedException($"Chunk {next} of source {source.SourceId} is missing.");
        }

        // Whether a chunk is the last one is part of what its tag covers: a count lowered in the database is found here.
        chunk = SourceChunkCipher.Decrypt(key, source.ProjectId, source.SourceId, next, last: next == source.Chunks - 1, ciphertext);
        place = 0;
        next++;
        if (next == source.Chunks && given + chunk.Length != source.Bytes)
        {
            throw new VaultDamagedException($"Source {source.SourceId} has {given + chunk.Length} bytes, not {source.Bytes}.");
        }
    }

    private int Give(Span<byte> buffer)
    {
        var length = Math.Min(buffer.Length, chunk.Length - place);
        chunk.AsSpan(place, length).CopyTo(buffer);
        place += length;
        given += length;
        return length;
    }
}
