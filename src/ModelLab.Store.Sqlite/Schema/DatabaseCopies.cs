using Microsoft.Data.Sqlite;
using ModelLab.Store.Sqlite.Connections;

namespace ModelLab.Store.Sqlite.Schema;

/// <summary>Whole copies of a database file while others write to it. Copying the file itself would lose what is in its log.</summary>
internal static class DatabaseCopies
{
    /// <summary>Writes one consistent state to a new file and checks it.</summary>
    /// <exception cref="StoreUnusableException">The copy did not pass its check.</exception>
    public static void Write(string from, string to)
    {
        using (var source = SqliteConnections.Open(from, SqliteOpenMode.ReadWrite))
        {
            source.Run("VACUUM INTO @to", new SqliteParameter("@to", to));
        }

        Settle(to);
        using var copy = SqliteConnections.Open(to, SqliteOpenMode.ReadOnly);
        var answers = copy.Texts("PRAGMA integrity_check");
        if (answers is not ["ok"])
        {
            throw new StoreUnusableException($"The copy {to} does not pass its check: {answers[0]}");
        }
    }

    /// <summary>Puts a copy that nobody writes to in its place.</summary>
    public static void Place(string copy, string to)
    {
        File.Copy(copy, to, overwrite: false);
        Settle(to);
    }

    /// <summary>Removes a database with its log.</summary>
    public static void Remove(string database)
    {
        SqliteConnection.ClearAllPools();
        File.Delete(database + "-wal");
        File.Delete(database + "-shm");
        File.Delete(database + "-journal");
        File.Delete(database);
    }

    private static void Settle(string file)
    {
        if (!OperatingSystem.IsWindows())
        {
            File.SetUnixFileMode(file, UnixFileMode.UserRead | UnixFileMode.UserWrite);
        }

        using var stream = new FileStream(file, FileMode.Open, FileAccess.ReadWrite);
        stream.Flush(flushToDisk: true);
    }
}
