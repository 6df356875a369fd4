using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Storage;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Sqlite.Connections;

/// <summary>Transactions and failures of SQLite.</summary>
public sealed class SqliteStoreProvider : IStoreProvider
{
    private const int Busy = 5;
    private const int ReadOnly = 8;
    private const int InputOutput = 10;
    private const int Corrupt = 11;
    private const int Full = 13;

    /// <summary>Begins with <c>BEGIN IMMEDIATE</c>, the driver's default: the right to write is taken before anything is read.</summary>
    public Task<IDbContextTransaction> BeginWriteAsync(ModelLabContext context, CancellationToken cancellation) =>
        context.Database.BeginTransactionAsync(cancellation);

    /// <summary>Begins with <c>BEGIN DEFERRED</c>: the first read fixes the state that is seen. It ends with its context.</summary>
    public async Task<IDbContextTransaction> BeginReadAsync(ModelLabContext context, CancellationToken cancellation)
    {
        await context.Database.OpenConnectionAsync(cancellation);
        var connection = (SqliteConnection)context.Database.GetDbConnection();
        return (await context.Database.UseTransactionAsync(connection.BeginTransaction(deferred: true), cancellation))!;
    }

    /// <inheritdoc/>
    public StorageFailedException? Explain(Exception failure)
    {
        for (var e = failure; e is not null; e = e.InnerException)
        {
            if (e is SqliteException sqlite)
            {
                return sqlite.SqliteErrorCode switch
                {
                    Full => new StorageFailedException("The disk that holds the data is full. Nothing of this change was stored; make room and do it again.", true, failure),
                    InputOutput => new StorageFailedException("The disk that holds the data could not be written or read. Nothing of this change was stored.", false, failure),
                    ReadOnly => new StorageFailedException("The data folder may not be written to. Nothing of this change was stored; check its permissions.", false, failure),
                    Busy => new StorageFailedException("Another program holds the database. Nothing of this change was stored; try again.", false, failure),
                    Corrupt => new StorageFailedException("The database file is damaged. Nothing of this change was stored; stop the server, run its check and restore a backup.", false, failure),
                    _ => null,
                };
            }
        }

        return null;
    }
}
