using System.Globalization;
using System.Text;
using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore;
using ModelLab.Store.Keys;
using ModelLab.Store.Sqlite.Connections;

namespace ModelLab.Store.Sqlite.Schema;

/// <summary>
/// Brings the database to this program's schema. Before an existing database is changed, a copy is made and noted in a
/// file; while that file stands, the migration is unfinished, and the next start begins again from the copy.
/// </summary>
internal sealed class SchemaMigration(StorePaths paths, TimeProvider time)
{
    private const int SnapshotsKept = 3;
    private const string NewDatabase = "new";

    private string Marker => Path.Combine(paths.DataFolder, "migration-unfinished");

    /// <summary>Puts back the state before a migration that did not come to its end.</summary>
    public void Recover()
    {
        if (!File.Exists(Marker))
        {
            return;
        }

        var snapshot = File.ReadAllText(Marker).Trim();
        if (snapshot == NewDatabase)
        {
            DatabaseCopies.Remove(paths.Database);
        }
        else if (File.Exists(snapshot))
        {
            DatabaseCopies.Remove(paths.Database);
            DatabaseCopies.Place(snapshot, paths.Database);
        }
        else
        {
            throw new StoreUnusableException(
                $"A migration did not come to its end and the copy made before it, {snapshot}, is gone. Restore a backup into an empty folder.");
        }

        File.Delete(Marker);
    }

    /// <summary>Migrates where there is something to do.</summary>
    /// <exception cref="StoreUnusableException">The database is of a newer program, or the migration failed; the state before it was put back.</exception>
    public bool Migrate()
    {
        var exists = File.Exists(paths.Database);
        ClearLock();
        using var context = SqliteContexts.Open(paths.Database);
        var applied = exists ? Applied() : [];
        var known = context.Database.GetMigrations().ToList();
        RefuseNewer(applied, known);
        if (known.Except(applied).FirstOrDefault() is not { } pending)
        {
            return false;
        }

        PrivateFiles.WriteNew(Marker, Encoding.UTF8.GetBytes(exists && HoldsTables() ? Snapshot(pending) : NewDatabase));
        try
        {
            using (var connection = SqliteConnections.Open(paths.Database))
            {
                AppendOnlyTriggers.Drop(connection);
            }

            context.Database.Migrate();
        }
        catch (Exception e)
        {
            context.Dispose();
            Recover();
            throw new StoreUnusableException($"The database could not be brought to the schema of this version ({pending}): {e.Message} The state before was put back.", e);
        }

        File.Delete(Marker);
        return true;
    }

    /// <summary>For the program's verbs, which never migrate: refuses a database that is not of this program's schema.</summary>
    /// <exception cref="StoreUnusableException">There is none, or it is older or newer.</exception>
    public void RefuseOther()
    {
        if (!File.Exists(paths.Database))
        {
            throw new StoreUnusableException($"There is no database in {paths.DataFolder}. Start the server once, or check ModelLab:DataFolder.");
        }

        using var context = SqliteContexts.Open(paths.Database);
        var applied = Applied();
        var known = context.Database.GetMigrations().ToList();
        RefuseNewer(applied, known);
        if (known.Except(applied).Any())
        {
            throw new StoreUnusableException("The database is of an older version of this program. Start the server once: it brings the database up to date.");
        }
    }

    // A program that was killed while it migrated leaves its lock behind; the next one would wait for it for ever.
    private void ClearLock()
    {
        if (!File.Exists(paths.Database))
        {
            return;
        }

        using var connection = SqliteConnections.Open(paths.Database);
        if (connection.Value("SELECT 1 FROM sqlite_master WHERE name = '__EFMigrationsLock'") is not null)
        {
            connection.Run("DELETE FROM __EFMigrationsLock");
        }
    }

    private List<string> Applied()
    {
        using (var connection = SqliteConnections.Open(paths.Database, SqliteOpenMode.ReadWrite))
        {
            if (connection.Value("SELECT 1 FROM sqlite_master WHERE name = '__EFMigrationsHistory'") is not null)
            {
                return [.. connection.Texts("SELECT MigrationId FROM __EFMigrationsHistory ORDER BY MigrationId")];
            }
        }

        return HoldsTables()
            ? throw new StoreUnusableException($"{paths.Database} is not a database of this program. Give another data folder (ModelLab:DataFolder).")
            : [];
    }

    private bool HoldsTables()
    {
        using var connection = SqliteConnections.Open(paths.Database, SqliteOpenMode.ReadWrite);
        return connection.Texts("SELECT name FROM sqlite_master WHERE type = 'table'")
            .Any(t => !t.StartsWith("sqlite_", StringComparison.Ordinal) && !t.StartsWith("__EFMigrations", StringComparison.Ordinal));
    }

    private static void RefuseNewer(List<string> applied, List<string> known)
    {
        if (applied.Except(known).ToList() is [.., var newer])
        {
            throw new StoreUnusableException(
                $"The database was written by a newer version of this program (it holds the change {newer}). Start that version, or restore a backup made before.");
        }
    }

    private string Snapshot(string pending)
    {
        PrivateFiles.MakeFolder(paths.SnapshotFolder);
        var stamp = time.GetUtcNow().ToString("yyyyMMdd'T'HHmmss'Z'", CultureInfo.InvariantCulture);
        var snapshot = Path.Combine(paths.SnapshotFolder, $"{stamp}-before-{pending}.db");
        File.Delete(snapshot);
        DatabaseCopies.Write(paths.Database, snapshot);
        foreach (var old in Directory.GetFiles(paths.SnapshotFolder, "*.db").Order(StringComparer.Ordinal).SkipLast(SnapshotsKept))
        {
            File.Delete(old);
        }

        return snapshot;
    }
}
