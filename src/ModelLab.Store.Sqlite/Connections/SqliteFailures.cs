using Microsoft.Data.Sqlite;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Sqlite.Connections;

/// <summary>What SQLite's result codes (sqlite3.h) mean for the one who keeps the server.</summary>
internal static class SqliteFailures
{
    private const int Busy = 5;
    private const int ReadOnly = 8;
    private const int InputOutput = 10;
    private const int Corrupt = 11;
    private const int Full = 13;

    /// <summary>The failure in plain words, or null where there are no better ones.</summary>
    public static StorageFailedException? Explain(Exception failure)
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
