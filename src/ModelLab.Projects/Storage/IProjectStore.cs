using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Storage;

/// <summary>The documents of one project's read model. Everything in it can be formed again from the ledger.</summary>
public interface IReadModel
{
    /// <summary>The document of a type and id, or null.</summary>
    T? Find<T>(string id)
        where T : class, IView;

    /// <summary>All documents of a type, in the order in which they were first put.</summary>
    IReadOnlyList<T> All<T>()
        where T : class, IView;
}

/// <summary>A read model that is being brought up to date.</summary>
public interface IReadModelWriter : IReadModel
{
    /// <summary>Adds a document or puts it in the place of the one with its id.</summary>
    void Put<T>(T view)
        where T : class, IView;
}

/// <summary>Content too large or too close to the source for an entry: kept encrypted under the source's key, addressed by its hash.</summary>
/// <param name="Hash">SHA-256 of <paramref name="Plain"/>.</param>
/// <param name="SourceId">Under whose key.</param>
/// <param name="Plain">The content.</param>
public sealed record KeptContent(Sha256Hash Hash, string SourceId, byte[] Plain);

/// <summary>What a use case hands over: together or not at all.</summary>
/// <param name="LedgerId">Project id.</param>
/// <param name="Drafts">The entries in order.</param>
/// <param name="Guard">Run inside the transaction on the state right before the entries; throws to refuse the whole batch.</param>
/// <param name="Contents">Content that the entries name by hash.</param>
/// <param name="AdoptedSources">Sources in the vault that these entries take up; until then they are orphans.</param>
public sealed record EntryBatch(
    string LedgerId, IReadOnlyList<EntryDraft> Drafts, Action<IReadModel> Guard,
    IReadOnlyList<KeptContent>? Contents = null, IReadOnlyList<string>? AdoptedSources = null);

/// <summary>Where read models are read from: the store, or memory in a replay.</summary>
public interface IReadModelSource
{
    /// <summary>Reads from one consistent state of a project's read model.</summary>
    Task<T> ReadAsync<T>(string projectId, Func<IReadModel, T> read, CancellationToken cancellation);
}

/// <summary>The store of all projects: ledgers and read models, changed in one transaction.</summary>
public interface IProjectStore : IReadModelSource
{
    /// <summary>The projects of which a person is a member, oldest first.</summary>
    Task<IReadOnlyList<ProjectView>> ProjectsOfAsync(string personId, CancellationToken cancellation);

    /// <summary>Appends a batch: guard, numbers, hashes, entries, sealed parts, read model and head in one transaction.</summary>
    Task<AppendedBatch> CommitAsync(EntryBatch batch, CancellationToken cancellation);

    /// <summary>Where a ledger stands.</summary>
    Task<LedgerHead> HeadAsync(string ledgerId, CancellationToken cancellation);

    /// <summary>Stored bytes of the entries with number ≥ <paramref name="from"/>, in order, as they stand in the store.</summary>
    IAsyncEnumerable<ReadOnlyMemory<byte>> EntriesAsync(string ledgerId, long from, CancellationToken cancellation);

    /// <summary>The hash stored beside an entry's bytes, which tells a changed entry from the one after it; null where there is no such entry.</summary>
    Task<Sha256Hash?> StoredHashAsync(string ledgerId, long number, CancellationToken cancellation);

    /// <summary>One entry.</summary>
    /// <exception cref="RefusedException">There is none of that number.</exception>
    Task<LedgerEntry> EntryAsync(string ledgerId, long number, CancellationToken cancellation);
}
