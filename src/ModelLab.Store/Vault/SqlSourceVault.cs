using System.Security.Cryptography;
using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Projects;
using ModelLab.Projects.Storage;
using ModelLab.Store.Keys;
using ModelLab.Store.Ledgers;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Vault;

/// <summary>Sources in chunks of 1 MiB, packed, then encrypted under a key of each source.</summary>
public sealed class SqlSourceVault(StoreWriter writer, IDbContextFactory<ModelLabContext> contexts, ISourceKeys keys, TimeProvider time) : ISourceVault
{
    private const int ChunksPerTransaction = 4;

    /// <inheritdoc/>
    /// <exception cref="RefusedException">The project has a source of this id already.</exception>
    /// <exception cref="StorageFailedException">The database could not store it; what was stored of it is removed.</exception>
    public async Task<StoredSource> StoreAsync(string projectId, string sourceId, Stream content, CancellationToken cancellation)
    {
        await AnnounceAsync(projectId, sourceId, cancellation);
        try
        {
            // Chunks come after their key is on the disk: a crash leaves a key without chunks, never the reverse.
            return await ReceiveAsync(projectId, sourceId, keys.Create(projectId, sourceId), content, cancellation);
        }
        catch
        {
            await RemoveAsync(projectId, sourceId);
            throw;
        }
    }

    /// <inheritdoc/>
    public Stream Open(string projectId, string sourceId)
    {
        using var context = contexts.CreateDbContext();
        var source = context.Sources.AsNoTracking().SingleOrDefault(s => s.ProjectId == projectId && s.SourceId == sourceId);
        if (source is null || source.Chunks == 0)
        {
            throw RefusedException.NotFound("source");
        }

        return new SourceStream(contexts, source, keys.Find(projectId, sourceId) ?? throw Withdrawn());
    }

    /// <inheritdoc/>
    /// <exception cref="RefusedException">An entry adopted it: it stays.</exception>
    public async Task DiscardAsync(string projectId, string sourceId, CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        await RemoveAsync(projectId, sourceId);
    }

    /// <inheritdoc/>
    public async Task<JsonObject?> UnsealAsync(string projectId, long entryNumber, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var bytes = await context.Entries.AsNoTracking()
            .Where(e => e.LedgerId == projectId && e.Number == entryNumber)
            .Select(e => e.CanonicalBytes)
            .SingleOrDefaultAsync(cancellation)
            ?? throw RefusedException.NotFound($"entry {entryNumber}");
        if (LedgerEntry.Parse(bytes).Sealed is not { } reference)
        {
            return null;
        }

        var row = await context.SealedParts.AsNoTracking().SingleOrDefaultAsync(p => p.LedgerId == projectId && p.EntryNumber == entryNumber, cancellation)
            ?? throw Mismatch(entryNumber);
        var key = keys.Find(projectId, row.SourceId) ?? throw Withdrawn();
        return SealedPartCipher.Open(key, row, reference) ?? throw Mismatch(entryNumber);
    }

    /// <inheritdoc/>
    /// <exception cref="VaultDamagedException">The stored content is not what was kept.</exception>
    public async Task<byte[]> ReadContentAsync(string projectId, Sha256Hash hash, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var rows = await context.KeptContents.AsNoTracking().Where(c => c.ProjectId == projectId && c.Hash == hash).ToListAsync(cancellation);
        if (rows.Count == 0)
        {
            throw RefusedException.NotFound("content");
        }

        // The same content may be kept under the keys of several sources; one that is left is enough.
        foreach (var row in rows)
        {
            if (keys.Find(projectId, row.SourceId) is { } key)
            {
                return KeptContentCipher.Decrypt(key, row);
            }
        }

        throw Withdrawn();
    }

    internal static RefusedException Withdrawn() =>
        new(RefusalKind.Withdrawn, "The source was withdrawn: what was stored of it can no longer be read. Figures in the ledger stay.");

    private static RefusedException Mismatch(long entryNumber) =>
        new(RefusalKind.Conflict, $"The sealed part of entry {entryNumber} does not match the entry: the store was changed from outside. Run the check and restore a backup.");

    private static async Task<int> FillAsync(Stream content, byte[] buffer, CancellationToken cancellation) =>
        await content.ReadAtLeastAsync(buffer, buffer.Length, throwOnEndOfStream: false, cancellation);

    private Task<string> AnnounceAsync(string projectId, string sourceId, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            if (await context.Sources.AnyAsync(s => s.ProjectId == projectId && s.SourceId == sourceId))
            {
                throw new RefusedException(RefusalKind.Conflict, $"The project has a source {sourceId} already.");
            }

            context.Sources.Add(new SourceRow { ProjectId = projectId, SourceId = sourceId, ReceivedAt = time.GetUtcNow() });
            return sourceId;
        },
        cancellation);

    private async Task<StoredSource> ReceiveAsync(string projectId, string sourceId, SourceKey key, Stream content, CancellationToken cancellation)
    {
        using var sha = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        var waiting = new List<SourceChunkRow>(ChunksPerTransaction);
        var current = new byte[SourceChunkCipher.PlainLength];
        var ahead = new byte[SourceChunkCipher.PlainLength];
        var length = await FillAsync(content, current, cancellation);
        var bytes = 0L;
        for (var index = 0; ; index++)
        {
            // One chunk is read ahead: a chunk's ciphertext says whether it is the last.
            var following = length < current.Length ? 0 : await FillAsync(content, ahead, cancellation);
            var last = following == 0;
            sha.AppendData(current, 0, length);
            bytes += length;
            waiting.Add(SourceChunkCipher.Encrypt(key, projectId, sourceId, index, last, current.AsSpan(0, length)));
            if (last)
            {
                var source = new StoredSource(new Sha256Hash(sha.GetHashAndReset()), bytes);
                await WriteAsync(projectId, sourceId, waiting, source, chunks: index + 1, cancellation);
                return source;
            }

            if (waiting.Count == ChunksPerTransaction)
            {
                await WriteAsync(projectId, sourceId, waiting, null, 0, cancellation);
                waiting.Clear();
            }

            (current, ahead, length) = (ahead, current, following);
        }
    }

    private Task<int> WriteAsync(
        string projectId, string sourceId, List<SourceChunkRow> chunkRows, StoredSource? complete, int chunks, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            context.SourceChunks.AddRange(chunkRows);
            if (complete is not null)
            {
                var source = await context.Sources.SingleAsync(s => s.ProjectId == projectId && s.SourceId == sourceId);
                source.Sha256 = complete.Sha256;
                source.Bytes = complete.Bytes;
                source.Chunks = chunks;
            }

            return chunkRows.Count;
        },
        cancellation);

    private async Task RemoveAsync(string projectId, string sourceId)
    {
        await writer.WriteAsync(
            async context =>
            {
                if (await context.Sources.AnyAsync(s => s.ProjectId == projectId && s.SourceId == sourceId && s.Adopted))
                {
                    throw new RefusedException(RefusalKind.Conflict, "The source was taken up by the project and stays.");
                }

                await context.SourceChunks.Where(c => c.ProjectId == projectId && c.SourceId == sourceId).ExecuteDeleteAsync();
                return await context.Sources.Where(s => s.ProjectId == projectId && s.SourceId == sourceId).ExecuteDeleteAsync();
            },
            CancellationToken.None);
        keys.Forget(projectId, sourceId);
    }
}
