using Microsoft.EntityFrameworkCore.Storage;

namespace ModelLab.Store.Writing;

/// <summary>What differs from database to database in reading and writing.</summary>
public interface IStoreProvider
{
    /// <summary>Begins a transaction that holds the right to write from its beginning, so that what it reads stays true until it ends.</summary>
    Task<IDbContextTransaction> BeginWriteAsync(ModelLabContext context, CancellationToken cancellation);

    /// <summary>Begins a transaction that sees one state and keeps nobody from writing.</summary>
    Task<IDbContextTransaction> BeginReadAsync(ModelLabContext context, CancellationToken cancellation);

    /// <summary>A failure of the database in words for its user, or null where there are no better ones.</summary>
    StorageFailedException? Explain(Exception failure);
}

/// <summary>The database could not carry out a change. Nothing of it was stored.</summary>
public sealed class StorageFailedException(string message, bool full, Exception inner) : IOException(message, inner)
{
    /// <summary>The disk is full.</summary>
    public bool Full { get; } = full;
}
