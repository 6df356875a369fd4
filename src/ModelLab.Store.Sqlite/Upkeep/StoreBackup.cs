using Microsoft.Data.Sqlite;
using ModelLab.Store.Keys;
using ModelLab.Store.Sqlite.Connections;
using ModelLab.Store.Sqlite.Schema;
using ModelLab.Store.Sqlite.Starting;

namespace ModelLab.Store.Sqlite.Upkeep;

/// <summary>A backup's two halves, which belong together by their id.</summary>
/// <param name="BackupId">The common id.</param>
/// <param name="DataFolder">Folder of the data.</param>
/// <param name="KeysFolder">Folder of the keys; to be kept apart from the data.</param>
/// <param name="DataBytes">Size of the data.</param>
public sealed record BackupResult(string BackupId, string DataFolder, string KeysFolder, long DataBytes);

/// <summary>The verb <c>backup</c>: copies data and keys into two folders, also while the server writes.</summary>
public sealed class StoreBackup(StorePaths paths, StoreStartup startup)
{
    /// <summary>Makes a backup and checks it.</summary>
    /// <param name="dataTo">A new or empty folder for the data.</param>
    /// <param name="keysTo">Another new or empty folder for the keys.</param>
    /// <exception cref="StoreUnusableException">A folder is not empty, both are the same, or a copy did not pass its check.</exception>
    public BackupResult Run(string dataTo, string keysTo)
    {
        startup.OpenForVerb();
        var data = BackupFolders.Empty(dataTo);
        var keys = BackupFolders.Empty(keysTo);
        BackupFolders.RefuseOneInTheOther(data, keys);
        var id = Guid.NewGuid().ToString("N");

        // Data first: a key is made before what is under it, so that keys copied later cover all data copied earlier.
        var database = Path.Combine(data, BackupFolders.Database);
        Copy(paths.Database, database, "store_facts", id);
        Copy(paths.KeysDatabase, Path.Combine(keys, BackupFolders.KeysDatabase), "key_facts", id);
        PrivateFiles.WriteNew(Path.Combine(keys, BackupFolders.MasterKey), File.ReadAllBytes(paths.MasterKeyFile));
        PrivateFiles.WriteNew(Path.Combine(keys, BackupFolders.SigningKey), File.ReadAllBytes(paths.ReceiptSigningKeyFile));
        return new BackupResult(id, data, keys, new FileInfo(database).Length);
    }

    private static void Copy(string from, string to, string facts, string id)
    {
        DatabaseCopies.Write(from, to);
        using var copy = SqliteConnections.Open(to, SqliteOpenMode.ReadWrite);
        copy.Run(
            $"INSERT INTO {facts} (name, value) VALUES ('backup-id', @id) ON CONFLICT (name) DO UPDATE SET value = excluded.value", new SqliteParameter("@id", id));
    }
}
