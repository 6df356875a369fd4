using Microsoft.EntityFrameworkCore.Design;
using ModelLab.Store.Sqlite.Connections;

namespace ModelLab.Store.Sqlite.Schema;

/// <summary>Gives the migration tool a context; it compares models and opens no database.</summary>
public sealed class DesignTimeContexts : IDesignTimeDbContextFactory<ModelLabContext>
{
    /// <inheritdoc/>
    public ModelLabContext CreateDbContext(string[] args) => SqliteContexts.Open("design-time.db");
}
