using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Storage;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Sqlite.Connections;

/// <summary>Transactions and failures of SQLite.</summary>
public sealed class SqliteStoreProvider : IStoreProvider
{
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
    public StorageFailedException? Explain(Exception failure) => SqliteFailures.Explain(failure);
}
