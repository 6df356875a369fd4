using System.Data.Common;
using Microsoft.EntityFrameworkCore.Diagnostics;

namespace ModelLab.Store.Sqlite.Connections;

/// <summary>Sets what SQLite forgets with each connection.</summary>
internal sealed class ConnectionSettings : DbConnectionInterceptor
{
    public override void ConnectionOpened(DbConnection connection, ConnectionEndEventData eventData) => Set(connection);

    public override Task ConnectionOpenedAsync(DbConnection connection, ConnectionEndEventData eventData, CancellationToken cancellationToken = default)
    {
        Set(connection);
        return Task.CompletedTask;
    }

    private static void Set(DbConnection connection)
    {
        using var command = connection.CreateCommand();
        command.CommandText = SqliteConnections.PerConnection;
        command.ExecuteNonQuery();
    }
}
