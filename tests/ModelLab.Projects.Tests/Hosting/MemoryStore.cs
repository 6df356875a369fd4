using System.Collections.Concurrent;
using System.Runtime.CompilerServices;
using System.Text.Json.Nodes;
using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Tests.Hosting;

/// <summary>A store in memory that keeps the same promises as the real one: guard, number, hash and read model together or not at all.</summary>
public sealed class MemoryStore : IProjectStore, ISourceVault, IPeople
{
    private readonly Lock gate = new();
    private readonly Dictionary<string, Kept> ledgers = new(StringComparer.Ordinal);
    private readonly ConcurrentDictionary<string, byte[]> sources = new(StringComparer.Ordinal);
    private readonly Dictionary<string, Person> people = new(StringComparer.Ordinal);

    public int SourcesHeld => sources.Count;

    /// <summary>Sources that were to be discarded.</summary>
    public List<string> Discarded { get; } = [];

    /// <summary>Run before a batch is committed, as somebody faster would.</summary>
    public Action? BeforeCommit { get; set; }

    /// <summary>Run after a batch was committed.</summary>
    public Action? AfterCommit { get; set; }

    public void Add(Person person) => people[person.Id] = person;

    /// <summary>Puts other bytes in the place of a source, as someone with the disk in hand could.</summary>
    public void ReplaceSource(string sourceId, byte[] bytes) => sources[sourceId] = bytes;

    /// <summary>Puts other bytes in the place of an entry.</summary>
    public void ReplaceEntry(string ledgerId, long number, byte[] bytes) => ledgers[ledgerId].Entries[(int)number - 1] = bytes;

    /// <summary>Puts another head in the place of the stored one.</summary>
    public void ReplaceHead(string ledgerId, LedgerHead head) => ledgers[ledgerId].Head = head;

    /// <summary>Puts other bytes in the place of kept content.</summary>
    public void ReplaceContent(string ledgerId, Sha256Hash hash, byte[] bytes) => ledgers[ledgerId].Contents[hash.ToString()] = bytes;

    /// <summary>The sealed part of an entry, to be altered in place.</summary>
    public JsonObject SealedPart(string ledgerId, long number) => ledgers[ledgerId].Sealed[number];

    public MemoryReadModel Model(string projectId) => ledgers[projectId].Model;

    public IReadOnlyList<byte[]> Entries(string projectId) => ledgers[projectId].Entries;

    public Task<IReadOnlyList<ProjectView>> ProjectsOfAsync(string personId, CancellationToken cancellation) =>
        Task.FromResult<IReadOnlyList<ProjectView>>(
            [.. ledgers.Where(l => l.Value.Model.Find<MemberView>(personId)?.Role is not null).Select(l => l.Value.Model.Find<ProjectView>(l.Key)!)]);

    public Task<T> ReadAsync<T>(string projectId, Func<IReadModel, T> read, CancellationToken cancellation)
    {
        lock (gate)
        {
            return Task.FromResult(read(ledgers.TryGetValue(projectId, out var kept) ? kept.Model : new MemoryReadModel()));
        }
    }

    public Task<AppendedBatch> CommitAsync(EntryBatch batch, CancellationToken cancellation)
    {
        var (before, after) = (BeforeCommit, AfterCommit);
        BeforeCommit = AfterCommit = null;
        before?.Invoke();
        var appended = Commit(batch);
        after?.Invoke();
        return Task.FromResult(appended);
    }

    private AppendedBatch Commit(EntryBatch batch)
    {
        lock (gate)
        {
            var kept = ledgers.TryGetValue(batch.LedgerId, out var known) ? known : new Kept(batch.LedgerId);
            batch.Guard(kept.Model);
            var appended = LedgerAppender.Append(kept.Head, batch.Drafts);
            foreach (var (entry, draft) in appended.Entries.Zip(batch.Drafts))
            {
                kept.Entries.Add(entry.CanonicalBytes.ToArray());
                kept.Hashes[entry.Number] = entry.Hash;
                ProjectProjection.Apply(LedgerEntry.Parse(entry.CanonicalBytes), kept.Model);
                if (draft.Sealed is not null)
                {
                    kept.Sealed[entry.Number] = draft.Sealed.Content;
                }
            }

            foreach (var content in batch.Contents ?? [])
            {
                kept.Contents[content.Hash.ToString()] = content.Plain;
            }

            kept.Head = appended.Head;
            ledgers[batch.LedgerId] = kept;
            return appended;
        }
    }

    public Task<LedgerHead> HeadAsync(string ledgerId, CancellationToken cancellation) => Task.FromResult(ledgers[ledgerId].Head);

    public async IAsyncEnumerable<ReadOnlyMemory<byte>> EntriesAsync(string ledgerId, long from, [EnumeratorCancellation] CancellationToken cancellation)
    {
        foreach (var bytes in ledgers[ledgerId].Entries.Skip((int)from - 1).ToList())
        {
            await Task.Yield();
            yield return bytes;
        }
    }

    public Task<Sha256Hash?> StoredHashAsync(string ledgerId, long number, CancellationToken cancellation) =>
        Task.FromResult(ledgers[ledgerId].Hashes.TryGetValue(number, out var hash) ? hash : (Sha256Hash?)null);

    public Task<LedgerEntry> EntryAsync(string ledgerId, long number, CancellationToken cancellation) =>
        Task.FromResult(LedgerEntry.Parse(ledgers[ledgerId].Entries[(int)number - 1]));

    public async Task<StoredSource> StoreAsync(string projectId, string sourceId, Stream content, CancellationToken cancellation)
    {
        using var buffer = new MemoryStream();
        await content.CopyToAsync(buffer, cancellation);
        sources[sourceId] = buffer.ToArray();
        return new StoredSource(Sha256Hash.Of(sources[sourceId]), buffer.Length);
    }

    public Stream Open(string projectId, string sourceId) =>
        sources.TryGetValue(sourceId, out var bytes) ? new MemoryStream(bytes, writable: false) : throw new RefusedException(RefusalKind.Withdrawn, "This source was withdrawn.");

    public Task DiscardAsync(string projectId, string sourceId, CancellationToken cancellation)
    {
        Discarded.Add(sourceId);
        sources.TryRemove(sourceId, out _);
        return Task.CompletedTask;
    }

    public Task<JsonObject?> UnsealAsync(string projectId, long entryNumber, CancellationToken cancellation) =>
        Task.FromResult(ledgers[projectId].Sealed.TryGetValue(entryNumber, out var content) ? (JsonObject?)content.DeepClone() : null);

    public Task<byte[]> ReadContentAsync(string projectId, Sha256Hash hash, CancellationToken cancellation) =>
        Task.FromResult(ledgers[projectId].Contents[hash.ToString()]);

    public Task<Person?> FindAsync(string personId, CancellationToken cancellation) => Task.FromResult(people.GetValueOrDefault(personId));

    public Task<Person?> FindByEmailAsync(string email, CancellationToken cancellation) =>
        Task.FromResult(people.Values.FirstOrDefault(p => string.Equals(p.Email, email, StringComparison.OrdinalIgnoreCase)));

    private sealed class Kept(string id)
    {
        public LedgerHead Head { get; set; } = LedgerHead.Empty(id);

        public List<byte[]> Entries { get; } = [];

        public Dictionary<long, Sha256Hash> Hashes { get; } = [];

        public MemoryReadModel Model { get; } = new();

        public Dictionary<long, JsonObject> Sealed { get; } = [];

        public Dictionary<string, byte[]> Contents { get; } = [];
    }
}
