using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.DependencyInjection.Extensions;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Store.Accounts;
using ModelLab.Store.Keys;
using ModelLab.Store.Requests;
using ModelLab.Store.Server;
using ModelLab.Store.Sqlite.Connections;
using ModelLab.Store.Sqlite.Keys;
using ModelLab.Store.Sqlite.Starting;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Upkeep;
using ModelLab.Store.Vault;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Sqlite;

/// <summary>Registers the store on SQLite.</summary>
public static class SqliteStoreRegistration
{
    /// <summary>
    /// Registers the store: ports of the projects, people and tokens of the server, start-up, upkeep. The context itself is
    /// registered by its factory, and as a scoped service for the sign-in library alone. Nothing is opened before
    /// <see cref="StoreStartup"/> is asked to.
    /// </summary>
    /// <param name="services">The services.</param>
    /// <param name="settings">Where files lie; resolved here, so that a wrong setting stops the start.</param>
    /// <exception cref="StoreSettingsException">A setting is missing or wrong.</exception>
    public static IServiceCollection AddModelLabSqliteStore(this IServiceCollection services, StoreSettings settings)
    {
        var paths = settings.Resolve();
        services.TryAddSingleton(TimeProvider.System);
        services.AddSingleton(settings);
        services.AddSingleton(paths);

        services.AddDbContextFactory<ModelLabContext>(options => options.UseModelLabSqlite(paths.Database));
        services.AddSingleton<IStoreProvider, SqliteStoreProvider>();
        services.AddSingleton<StoreWriter>();

        services.AddSingleton<SqliteSourceKeys>();
        services.AddSingleton<ISourceKeys>(provider => provider.GetRequiredService<SqliteSourceKeys>());
        services.AddSingleton<ReceiptSigningKey>();

        services.AddSingleton<IProjectStore, SqlProjectStore>();
        services.AddSingleton<SqlSourceVault>();
        services.AddSingleton<ISourceVault>(provider => provider.GetRequiredService<SqlSourceVault>());
        services.AddSingleton<IPeople, SqlPeople>();
        services.AddSingleton<ServerRecords>();
        services.AddSingleton<ApiTokens>();
        services.AddSingleton<IdempotencyRecords>();

        services.AddSingleton<OrphanSweep>();
        services.AddSingleton<ReadModelRebuild>();
        services.AddSingleton<ContentCheck>();
        services.AddSingleton<StoreStartup>();
        services.AddSingleton<StoreCheck>();
        services.AddSingleton<StoreBackup>();
        services.AddSingleton<StoreRestore>();
        return services;
    }
}
