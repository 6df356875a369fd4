using Microsoft.EntityFrameworkCore;

namespace ModelLab.Store.Sqlite.Connections;

/// <summary>How a context is bound to a SQLite file.</summary>
public static class SqliteContexts
{
    private static readonly ConnectionSettings Settings = new();

    /// <summary>Binds to the file, with this assembly's migrations and the connection settings.</summary>
    public static DbContextOptionsBuilder UseModelLabSqlite(this DbContextOptionsBuilder options, string databaseFile) => options
        .UseSqlite(SqliteConnections.ToFile(databaseFile), sqlite => sqlite.MigrationsAssembly(typeof(SqliteContexts).Assembly.GetName().Name))
        .AddInterceptors(Settings);

    /// <summary>A context of its own for a file.</summary>
    public static ModelLabContext Open(string databaseFile)
    {
        var options = new DbContextOptionsBuilder<ModelLabContext>();
        options.UseModelLabSqlite(databaseFile);
        return new ModelLabContext(options.Options);
    }
}
