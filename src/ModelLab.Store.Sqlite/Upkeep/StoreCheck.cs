using Microsoft.Data.Sqlite;
using ModelLab.Store.Sqlite.Connections;
using ModelLab.Store.Sqlite.Schema;
using ModelLab.Store.Sqlite.Starting;
using ModelLab.Store.Upkeep;

namespace ModelLab.Store.Sqlite.Upkeep;

/// <summary>The verb <c>check</c>: the database file, its triggers, and everything stored in it. Runs beside a server; reads only.</summary>
public sealed class StoreCheck(StorePaths paths, StoreStartup startup, ContentCheck contents)
{
    /// <summary>Checks.</summary>
    /// <exception cref="StoreUnusableException">There is no database of this program's schema.</exception>
    public async Task<CheckResult> RunAsync(CancellationToken cancellation)
    {
        startup.OpenForVerb();
        var problems = new List<string>();
        using (var connection = SqliteConnections.Open(paths.Database, SqliteOpenMode.ReadWrite))
        {
            problems.AddRange(connection.Texts("PRAGMA integrity_check").Where(t => t != "ok").Select(t => $"Database file: {t}"));
            problems.AddRange(connection.Texts("PRAGMA foreign_key_check").Select(t => $"Table {t}: a row refers to one that does not exist."));
            problems.AddRange(AppendOnlyTriggers.Problems(connection));
        }

        var result = await contents.RunAsync(cancellation);
        return result with { Problems = [.. problems, .. result.Problems] };
    }
}
