using Microsoft.Data.Sqlite;
using ModelLab.Store.Keys;
using ModelLab.Store.Sqlite.Connections;
using ModelLab.Store.Sqlite.Schema;

namespace ModelLab.Store.Sqlite.Upkeep;

/// <summary>What a restore brought back.</summary>
/// <param name="BackupId">Id of the backup.</param>
/// <param name="DataFolder">Where the data lie now.</param>
/// <param name="WithdrawnAgain">Sources whose keys were destroyed again, since they had been withdrawn after the backup.</param>
public sealed record RestoreResult(string BackupId, string DataFolder, int WithdrawnAgain);

/// <summary>The verb <c>restore</c>: puts both halves of a backup into empty folders. The next start migrates and makes the triggers.</summary>
public sealed class StoreRestore(StorePaths paths)
{
    /// <summary>Restores.</summary>
    /// <param name="dataFrom">Folder of the backup's data.</param>
    /// <param name="keysFrom">Folder of the backup's keys.</param>
    /// <param name="laterKeysDatabase">
    /// A later database of keys (of the lost server or of a later backup): sources that it records as withdrawn are withdrawn again. Null for none.
    /// </param>
    /// <exception cref="StoreUnusableException">
    /// The target is not empty, a half is missing or damaged, or the halves are not of one backup. The target stays empty.
    /// </exception>
    public RestoreResult Run(string dataFrom, string keysFrom, string? laterKeysDatabase = null)
    {
        var database = BackupFolders.Existing(dataFrom, BackupFolders.Database);
        var keysDatabase = BackupFolders.Existing(keysFrom, BackupFolders.KeysDatabase);
        var masterKey = BackupFolders.Existing(keysFrom, BackupFolders.MasterKey);
        var signingKey = BackupFolders.Existing(keysFrom, BackupFolders.SigningKey);
        var id = Id(database, "store_facts");
        if (id != Id(keysDatabase, "key_facts"))
        {
            throw new StoreUnusableException("Data and keys are not of the same backup. Give the two folders that one backup wrote.");
        }

        var withdrawn = laterKeysDatabase is null ? [] : Withdrawn(Path.GetFullPath(laterKeysDatabase));
        BackupFolders.Empty(paths.DataFolder);
        BackupFolders.Empty(paths.KeysFolder);
        try
        {
            Put(masterKey, paths.MasterKeyFile);
            Put(signingKey, paths.ReceiptSigningKeyFile);
            DatabaseCopies.Place(keysDatabase, paths.KeysDatabase);
            var again = Withdraw(withdrawn);

            // The database comes last: until it stands there, there is nothing that a server would start on.
            DatabaseCopies.Place(database, paths.Database);
            return new RestoreResult(id, paths.DataFolder, again);
        }
        catch
        {
            // Both folders were empty before.
            DatabaseCopies.Remove(paths.Database);
            DatabaseCopies.Remove(paths.KeysDatabase);
            File.Delete(Path.Combine(paths.KeysFolder, BackupFolders.MasterKey));
            File.Delete(paths.ReceiptSigningKeyFile);
            throw;
        }
    }

    private static void Put(string from, string to)
    {
        if (File.Exists(to))
        {
            if (!File.ReadAllBytes(from).AsSpan().SequenceEqual(File.ReadAllBytes(to)))
            {
                throw new StoreUnusableException($"{to} exists and is another key than the backup's. Move it away first.");
            }

            return;
        }

        PrivateFiles.WriteNew(to, File.ReadAllBytes(from));
    }

    private static string Id(string database, string facts)
    {
        try
        {
            using var connection = SqliteConnections.Open(database, SqliteOpenMode.ReadOnly);
            if (connection.Texts("PRAGMA integrity_check") is not ["ok"])
            {
                throw new StoreUnusableException($"{database} does not pass its check: the backup is damaged.");
            }

            return (string?)connection.Value($"SELECT value FROM {facts} WHERE name = 'backup-id'")
                ?? throw new StoreUnusableException($"{database} was not written by a backup.");
        }
        catch (SqliteException e)
        {
            throw new StoreUnusableException($"{database} cannot be read as a backup: {e.Message}", e);
        }
    }

    private static List<(string Project, string Source, long At)> Withdrawn(string laterKeys)
    {
        using var connection = SqliteConnections.Open(laterKeys, SqliteOpenMode.ReadOnly);
        using var command = connection.CreateCommand();
        command.CommandText = "SELECT project_id, source_id, destroyed_at FROM source_keys WHERE destroyed_at IS NOT NULL";
        using var reader = command.ExecuteReader();
        var withdrawn = new List<(string, string, long)>();
        while (reader.Read())
        {
            withdrawn.Add((reader.GetString(0), reader.GetString(1), reader.GetInt64(2)));
        }

        return withdrawn;
    }

    private int Withdraw(List<(string Project, string Source, long At)> withdrawn)
    {
        using var connection = SqliteConnections.Open(paths.KeysDatabase);
        var again = 0;
        foreach (var (project, source, at) in withdrawn)
        {
            again += (int)(long)connection.Value(
                """
                UPDATE source_keys SET wrapped = NULL, destroyed_at = @at WHERE project_id = @project AND source_id = @source AND destroyed_at IS NULL;
                SELECT changes();
                """,
                new SqliteParameter("@project", project), new SqliteParameter("@source", source), new SqliteParameter("@at", at))!;
        }

        return again;
    }
}
