using System.Runtime.CompilerServices;
using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Projects;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Store.Documents;
using ModelLab.Store.Keys;
using ModelLab.Store.Ledgers;
using ModelLab.Store.Server;
using ModelLab.Store.Vault;
using ModelLab.Store.Writing;

namespace ModelLab.Store;

/// <summary>Ledgers and read models in a relational database, changed in one transaction.</summary>
public sealed class SqlProjectStore(
    StoreWriter writer, IDbContextFactory<ModelLabContext> contexts, IStoreProvider provider, ISourceKeys keys, TimeProvider time) : IProjectStore
{
    private const int EntriesPerPage = 128;

    private readonly ReadModelCache cache = new();

    /// <inheritdoc/>
    public async Task<IReadOnlyList<ProjectView>> ProjectsOfAsync(string personId, CancellationToken cancellation)
    {
        var members = ReadModelCollections.Names[typeof(MemberView)];
        var projects = ReadModelCollections.Names[typeof(ProjectView)];
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        await using var transaction = await provider.BeginReadAsync(context, cancellation);
        var memberships = await context.Documents.AsNoTracking()
            .Where(d => d.Collection == members && d.Id == personId)
            .Select(d => new { d.LedgerId, d.Json })
            .ToListAsync(cancellation);
        var ledgers = memberships
            .Where(m => JsonSerializer.Deserialize<MemberView>(m.Json, ProjectJson.Options)!.Role is not null)
            .Select(m => m.LedgerId)
            .ToList();
        var found = await context.Documents.AsNoTracking()
            .Where(d => d.Collection == projects && ledgers.Contains(d.LedgerId))
            .Select(d => d.Json)
            .ToListAsync(cancellation);
        return [.. found
            .Select(json => JsonSerializer.Deserialize<ProjectView>(json, ProjectJson.Options)!)
            .OrderBy(p => p.OpenedAt)
            .ThenBy(p => p.Id, StringComparer.Ordinal)];
    }

    /// <inheritdoc/>
    public async Task<T> ReadAsync<T>(string projectId, Func<IReadModel, T> read, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        await using var transaction = await provider.BeginReadAsync(context, cancellation);
        var head = await HeadRowAsync(context, projectId, cancellation);
        return read(new DocumentSession(context, projectId, cache.Get(head)));
    }

    /// <inheritdoc/>
    /// <exception cref="RefusedException">
    /// The guard refused; a source to adopt is unknown, incomplete or adopted already; or the key that a sealed part or
    /// kept content needs was destroyed. Nothing was stored.
    /// </exception>
    /// <exception cref="StorageFailedException">The database could not store it. Nothing was stored.</exception>
    public async Task<AppendedBatch> CommitAsync(EntryBatch batch, CancellationToken cancellation)
    {
        if (batch.Drafts.Count == 0 || batch.LedgerId == ServerLedger.Id)
        {
            throw new ArgumentException("A batch holds at least one entry of a project's ledger.", nameof(batch));
        }

        // Packing and encrypting takes long and needs no transaction.
        var contents = (batch.Contents ?? []).Select(c => KeptContentCipher.Encrypt(KeyOf(batch.LedgerId, c.SourceId), batch.LedgerId, c)).ToList();
        var (appended, after) = await writer.WriteAsync(
            async context =>
            {
                var head = await LedgerTransaction.HeadAsync(context, batch.LedgerId);
                var session = new DocumentSession(context, batch.LedgerId, cache.Get(head));
                batch.Guard(session);
                await AdoptAsync(context, batch);
                var result = LedgerTransaction.Append(context, head, batch.Drafts, sourceId => KeyOf(batch.LedgerId, sourceId));
                foreach (var entry in result.Entries)
                {
                    ProjectProjection.Apply(entry, session);
                }

                session.WriteChanges();
                await KeepAsync(context, contents);
                return (result, session.After(head));
            },
            cancellation);
        cache.Put(batch.LedgerId, after);
        return appended;
    }

    /// <inheritdoc/>
    public async Task<LedgerHead> HeadAsync(string ledgerId, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        return (await HeadRowAsync(context, ledgerId, cancellation)).ToHead();
    }

    /// <inheritdoc/>
    public async IAsyncEnumerable<ReadOnlyMemory<byte>> EntriesAsync(
        string ledgerId, long from, [EnumeratorCancellation] CancellationToken cancellation)
    {
        var next = from;
        while (true)
        {
            await using var context = await contexts.CreateDbContextAsync(cancellation);
            var page = await context.Entries.AsNoTracking()
                .Where(e => e.LedgerId == ledgerId && e.Number >= next)
                .OrderBy(e => e.Number)
                .Take(EntriesPerPage)
                .Select(e => new { e.Number, e.CanonicalBytes })
                .ToListAsync(cancellation);
            foreach (var entry in page)
            {
                yield return entry.CanonicalBytes;
            }

            if (page.Count < EntriesPerPage)
            {
                yield break;
            }

            next = page[^1].Number + 1;
        }
    }

    /// <inheritdoc/>
    public async Task<Sha256Hash?> StoredHashAsync(string ledgerId, long number, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var found = await context.Entries.AsNoTracking()
            .Where(e => e.LedgerId == ledgerId && e.Number == number)
            .Select(e => new { e.Hash })
            .SingleOrDefaultAsync(cancellation);
        return found?.Hash;
    }

    /// <inheritdoc/>
    public async Task<LedgerEntry> EntryAsync(string ledgerId, long number, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var bytes = await context.Entries.AsNoTracking()
            .Where(e => e.LedgerId == ledgerId && e.Number == number)
            .Select(e => e.CanonicalBytes)
            .SingleOrDefaultAsync(cancellation)
            ?? throw RefusedException.NotFound($"entry {number}");
        return LedgerEntry.Parse(bytes);
    }

    private static async Task<LedgerHeadRow> HeadRowAsync(ModelLabContext context, string ledgerId, CancellationToken cancellation) =>
        await context.Heads.AsNoTracking().SingleOrDefaultAsync(h => h.LedgerId == ledgerId, cancellation) ?? new LedgerHeadRow { LedgerId = ledgerId };

    private static async Task KeepAsync(ModelLabContext context, IReadOnlyList<KeptContentRow> contents)
    {
        foreach (var content in contents.DistinctBy(c => (c.Hash, c.SourceId)))
        {
            if (!await context.KeptContents.AnyAsync(c => c.ProjectId == content.ProjectId && c.Hash == content.Hash && c.SourceId == content.SourceId))
            {
                context.KeptContents.Add(content);
            }
        }
    }

    private async Task AdoptAsync(ModelLabContext context, EntryBatch batch)
    {
        foreach (var sourceId in batch.AdoptedSources ?? [])
        {
            var source = await context.Sources.SingleOrDefaultAsync(s => s.ProjectId == batch.LedgerId && s.SourceId == sourceId);
            if (source is null || source.Chunks == 0)
            {
                throw new RefusedException(
                    RefusalKind.NotFound, "The uploaded file is not on the server (any more): it was not received to its end, or waited too long. Upload it again.");
            }

            if (source.Adopted)
            {
                throw new RefusedException(RefusalKind.Conflict, "The uploaded file was taken up already.");
            }

            source.Adopted = true;
            source.AdoptedAt = time.GetUtcNow();
        }
    }

    private SourceKey KeyOf(string projectId, string sourceId) => keys.Find(projectId, sourceId) ?? throw SqlSourceVault.Withdrawn();
}
