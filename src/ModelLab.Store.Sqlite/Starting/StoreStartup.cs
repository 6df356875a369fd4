using Microsoft.Data.Sqlite;
using Microsoft.Extensions.Logging;
using ModelLab.Store.Keys;
using ModelLab.Store.Sqlite.Connections;
using ModelLab.Store.Sqlite.Keys;
using ModelLab.Store.Sqlite.Schema;
using ModelLab.Store.Upkeep;
using ModelLab.Store.Vault;

namespace ModelLab.Store.Sqlite.Starting;

/// <summary>
/// Makes the store ready before anything else uses it. Holds the data folder against a second server until disposed of.
/// </summary>
public sealed partial class StoreStartup(
    StorePaths paths, SqliteSourceKeys keys, ReceiptSigningKey signingKey, ReadModelRebuild readModels, OrphanSweep sweep, TimeProvider time, ILogger<StoreStartup>? log = null) : IDisposable
{
    private ServerLock? held;

    /// <summary>
    /// For a server: folders, lock, recovery of an unfinished migration, keys, check, migration with a copy before it,
    /// triggers, read models of an older form, orphans.
    /// </summary>
    /// <exception cref="StoreUnusableException">The store cannot be used; the message says why and what to do.</exception>
    /// <exception cref="KeysUnusableException">The keys cannot be used.</exception>
    public async Task StartAsync(CancellationToken cancellation)
    {
        PrivateFiles.MakeFolder(paths.DataFolder);
        held ??= ServerLock.Take(paths);
        var migration = new SchemaMigration(paths, time);
        migration.Recover();
        keys.Prepare();
        signingKey.Open().Dispose();
        RefuseDamaged();
        var migrated = migration.Migrate();
        using (var connection = SqliteConnections.Open(paths.Database))
        {
            connection.Run("PRAGMA journal_mode=WAL");
            var made = AppendOnlyTriggers.Ensure(connection);
            if (!migrated && made.Count > 0 && log is not null)
            {
                LogTriggersGone(log, string.Join(", ", made));
            }

            connection.Run(
                "INSERT INTO store_facts (name, value) VALUES ('store-id', @id) ON CONFLICT (name) DO NOTHING",
                new SqliteParameter("@id", Guid.NewGuid().ToString("N")));
        }

        await readModels.ReplaceOutdatedAsync(cancellation);
        await sweep.SweepAsync(atStart: true, cancellation);
    }

    /// <summary>For the program's verbs, beside a running server or without one: takes no lock, migrates nothing, changes nothing.</summary>
    /// <exception cref="StoreUnusableException">There is no database of this program's schema.</exception>
    public void OpenForVerb() => new SchemaMigration(paths, time).RefuseOther();

    /// <summary>Lets go of the data folder.</summary>
    public void Dispose() => held?.Dispose();

    [LoggerMessage(LogLevel.Critical, "Triggers that protect what is append-only were gone or changed, and no migration had done it: {Triggers}. They were made anew. Somebody changed the database from outside: run 'check', and compare the ledgers with receipts kept elsewhere")]
    private static partial void LogTriggersGone(ILogger log, string triggers);

    private void RefuseDamaged()
    {
        if (!File.Exists(paths.Database))
        {
            return;
        }

        try
        {
            using var connection = SqliteConnections.Open(paths.Database);
            if (connection.Texts("PRAGMA quick_check(1)") is not ["ok"])
            {
                throw Damaged(null);
            }
        }
        catch (SqliteException e) when (e.SqliteErrorCode is 11 or 26)
        {
            throw Damaged(e);
        }
    }

    private StoreUnusableException Damaged(Exception? inner) => new(
        $"The database {paths.Database} is damaged. Keep a copy of the folder, then restore a backup into an empty one.", inner);
}
