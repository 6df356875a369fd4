using System.Security.Cryptography;
using Microsoft.Data.Sqlite;
using ModelLab.Store.Keys;
using ModelLab.Store.Sqlite.Connections;

namespace ModelLab.Store.Sqlite.Keys;

/// <summary>Source keys, wrapped under the master key, in a small database of their own. Deleted content is overwritten in it.</summary>
public sealed class SqliteSourceKeys(StorePaths paths, TimeProvider time) : ISourceKeys
{
    private const int SchemaVersion = 1;
    private const string FingerprintName = "master-key-fingerprint";

    private readonly Lock gate = new();
    private MasterKey? master;

    /// <summary>At the start of a server: makes database and master key where there are none, and checks that they belong together.</summary>
    /// <exception cref="KeysUnusableException">They do not, or one is missing.</exception>
    public void Prepare()
    {
        PrivateFiles.MakeFolder(paths.KeysFolder);
        using var connection = Open();
        var version = (long)connection.Value("PRAGMA user_version")!;
        if (version > SchemaVersion)
        {
            throw new KeysUnusableException($"{paths.KeysDatabase} was written by a newer version of this program. Start that version.");
        }

        if (version == 0)
        {
            connection.Run($"""
                BEGIN IMMEDIATE;
                CREATE TABLE IF NOT EXISTS key_facts (name TEXT NOT NULL PRIMARY KEY, value TEXT NOT NULL) WITHOUT ROWID;
                CREATE TABLE IF NOT EXISTS source_keys (
                    project_id TEXT NOT NULL, source_id TEXT NOT NULL, made_at INTEGER NOT NULL, wrapped BLOB NULL, destroyed_at INTEGER NULL,
                    PRIMARY KEY (project_id, source_id));
                PRAGMA user_version={SchemaVersion};
                COMMIT;
                """);
        }

        var known = (string?)connection.Value("SELECT value FROM key_facts WHERE name = @name", new SqliteParameter("@name", FingerprintName));
        if (known is null && !File.Exists(paths.MasterKeyFile))
        {
            MasterKey.Create(paths.MasterKeyFile);
        }

        var read = MasterKey.Read(paths.MasterKeyFile);
        if (known is null)
        {
            connection.Run(
                "INSERT INTO key_facts (name, value) VALUES (@name, @value)", new SqliteParameter("@name", FingerprintName), new SqliteParameter("@value", read.Fingerprint));
        }
        else if (known != read.Fingerprint)
        {
            throw new KeysUnusableException($"The master key {paths.MasterKeyFile} is not the one under which {paths.KeysDatabase} was written. Restore both from the same backup.");
        }
    }

    /// <inheritdoc/>
    public SourceKey Create(string projectId, string sourceId)
    {
        var key = RandomNumberGenerator.GetBytes(SourceKey.Length);
        using var connection = Open();
        try
        {
            connection.Run(
                "INSERT INTO source_keys (project_id, source_id, made_at, wrapped) VALUES (@project, @source, @at, @wrapped)",
                new SqliteParameter("@project", projectId), new SqliteParameter("@source", sourceId), new SqliteParameter("@at", Now()),
                new SqliteParameter("@wrapped", Master().Wrap(key, projectId, sourceId)));
        }
        catch (SqliteException e) when (e.SqliteErrorCode == 19)
        {
            throw new InvalidOperationException($"Source {sourceId} of project {projectId} has or had a key already.", e);
        }
        catch (SqliteException e) when (SqliteFailures.Explain(e) is { } plain)
        {
            throw plain;
        }

        return new SourceKey(key);
    }

    /// <inheritdoc/>
    public SourceKey? Find(string projectId, string sourceId)
    {
        using var connection = Open();
        var wrapped = (byte[]?)connection.Value(
            "SELECT wrapped FROM source_keys WHERE project_id = @project AND source_id = @source",
            new SqliteParameter("@project", projectId), new SqliteParameter("@source", sourceId));
        return wrapped is null ? null : new SourceKey(Master().Unwrap(wrapped, projectId, sourceId));
    }

    /// <inheritdoc/>
    public void Destroy(string projectId, string sourceId)
    {
        using var connection = Open();
        connection.Run(
            "UPDATE source_keys SET wrapped = NULL, destroyed_at = coalesce(destroyed_at, @at) WHERE project_id = @project AND source_id = @source",
            new SqliteParameter("@project", projectId), new SqliteParameter("@source", sourceId), new SqliteParameter("@at", Now()));
    }

    /// <inheritdoc/>
    public void Forget(string projectId, string sourceId)
    {
        using var connection = Open();
        connection.Run(
            "DELETE FROM source_keys WHERE project_id = @project AND source_id = @source AND destroyed_at IS NULL",
            new SqliteParameter("@project", projectId), new SqliteParameter("@source", sourceId));
    }

    /// <inheritdoc/>
    public IReadOnlyList<StoredKey> All()
    {
        using var connection = Open();
        using var command = connection.CreateCommand();
        command.CommandText = "SELECT project_id, source_id, made_at, destroyed_at FROM source_keys ORDER BY project_id, source_id";
        using var reader = command.ExecuteReader();
        var keys = new List<StoredKey>();
        while (reader.Read())
        {
            keys.Add(new StoredKey(reader.GetString(0), reader.GetString(1), Time(reader.GetInt64(2)), reader.IsDBNull(3) ? null : Time(reader.GetInt64(3))));
        }

        return keys;
    }

    private static DateTimeOffset Time(long microseconds) => DateTimeOffset.UnixEpoch + TimeSpan.FromMicroseconds(microseconds);

    private long Now() => (time.GetUtcNow() - DateTimeOffset.UnixEpoch).Ticks / TimeSpan.TicksPerMicrosecond;

    private MasterKey Master()
    {
        lock (gate)
        {
            return master ??= MasterKey.Read(paths.MasterKeyFile);
        }
    }

    private SqliteConnection Open()
    {
        var connection = new SqliteConnection(SqliteConnections.ToFile(paths.KeysDatabase));
        try
        {
            connection.Open();
            connection.Run(SqliteConnections.PerConnection);
            return connection;
        }
        catch
        {
            connection.Dispose();
            throw;
        }
    }
}
