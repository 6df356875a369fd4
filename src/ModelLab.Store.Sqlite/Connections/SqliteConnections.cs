using Microsoft.Data.Sqlite;

namespace ModelLab.Store.Sqlite.Connections;

/// <summary>How connections are opened: foreign keys on, every commit on the disk, deleted content overwritten, patience with another writer.</summary>
internal static class SqliteConnections
{
    /// <summary>Settings that hold for one connection and are set at each opening.</summary>
    public const string PerConnection = "PRAGMA synchronous=FULL; PRAGMA secure_delete=ON; PRAGMA recursive_triggers=ON;";

    private const int BusySeconds = 30;

    /// <summary>Connection string for a database file.</summary>
    public static string ToFile(string path, SqliteOpenMode mode = SqliteOpenMode.ReadWriteCreate, bool pooling = true) => new SqliteConnectionStringBuilder
    {
        DataSource = path,
        Mode = mode,
        ForeignKeys = true,
        DefaultTimeout = BusySeconds,
        Pooling = pooling,
    }.ToString();

    /// <summary>Opens a connection of its own, outside the pool, with all settings.</summary>
    public static SqliteConnection Open(string path, SqliteOpenMode mode = SqliteOpenMode.ReadWriteCreate)
    {
        var connection = new SqliteConnection(ToFile(path, mode, pooling: false));
        try
        {
            connection.Open();
            if (mode != SqliteOpenMode.ReadOnly)
            {
                connection.Run(PerConnection);
            }

            return connection;
        }
        catch
        {
            connection.Dispose();
            throw;
        }
    }

    /// <summary>Runs a statement of the program's own.</summary>
    public static void Run(this SqliteConnection connection, string sql, params ReadOnlySpan<SqliteParameter> parameters)
    {
        using var command = Command(connection, sql, parameters);
        command.ExecuteNonQuery();
    }

    /// <summary>The first value of a query of the program's own, or null.</summary>
    public static object? Value(this SqliteConnection connection, string sql, params ReadOnlySpan<SqliteParameter> parameters)
    {
        using var command = Command(connection, sql, parameters);
        return command.ExecuteScalar() is { } value and not DBNull ? value : null;
    }

    /// <summary>The first column of a query of the program's own, as text.</summary>
    public static IReadOnlyList<string> Texts(this SqliteConnection connection, string sql, params ReadOnlySpan<SqliteParameter> parameters)
    {
        using var command = Command(connection, sql, parameters);
        using var reader = command.ExecuteReader();
        var texts = new List<string>();
        while (reader.Read())
        {
            texts.Add(reader.IsDBNull(0) ? string.Empty : reader.GetString(0));
        }

        return texts;
    }

    private static SqliteCommand Command(SqliteConnection connection, string sql, ReadOnlySpan<SqliteParameter> parameters)
    {
        var command = connection.CreateCommand();
#pragma warning disable CA2100 // the statements are the program's own; values come as parameters
        command.CommandText = sql;
#pragma warning restore CA2100
        foreach (var parameter in parameters)
        {
            command.Parameters.Add(parameter);
        }

        return command;
    }
}
