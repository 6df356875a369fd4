using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore.Diagnostics;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Time.Testing;
using ModelLab.Projects;
using ModelLab.Projects.Storage;
using ModelLab.Store.Keys;
using ModelLab.Store.Sqlite;
using ModelLab.Store.Sqlite.Connections;
using ModelLab.Store.Sqlite.Starting;

namespace ModelLab.Store.Tests.Setting;

/// <summary>A store on real files in a folder of its own, removed afterwards.</summary>
internal sealed class TestStore : IAsyncDisposable
{
    private readonly ServiceProvider services;
    private readonly bool removes;

    private TestStore(string folder, FakeTimeProvider time, bool removes, IInterceptor? interceptor)
    {
        this.removes = removes;
        Folder = folder;
        Time = time;
        var collection = new ServiceCollection();
        collection.AddSingleton<TimeProvider>(time);
        collection.AddModelLabSqliteStore(new StoreSettings { DataFolder = folder });
        collection.AddModelLabProjects();
        Paths = new StoreSettings { DataFolder = folder }.Resolve();
        if (interceptor is not null)
        {
            collection.AddDbContextFactory<ModelLabContext>(options => options.UseModelLabSqlite(Paths.Database).AddInterceptors(interceptor));
        }

        services = collection.BuildServiceProvider(new ServiceProviderOptions { ValidateOnBuild = true });
    }

    public static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public string Folder { get; }

    public FakeTimeProvider Time { get; }

    public StorePaths Paths { get; }

    public IProjectStore Projects => Get<IProjectStore>();

    public ISourceVault Vault => Get<ISourceVault>();

    public ISourceKeys Keys => Get<ISourceKeys>();

    public static string NewFolder() => Directory.CreateTempSubdirectory("modellab-store-").FullName;

    /// <summary>A started store in a new folder.</summary>
    public static async Task<TestStore> StartAsync(IInterceptor? interceptor = null)
    {
        var store = Unstarted(NewFolder(), interceptor: interceptor);
        await store.Get<StoreStartup>().StartAsync(Cancellation);
        return store;
    }

    /// <summary>A store that is not started.</summary>
    /// <param name="folder">Its folder.</param>
    /// <param name="removes">Whether the folder goes with it.</param>
    /// <param name="interceptor">Sees its connections or commands.</param>
    public static TestStore Unstarted(string folder, bool removes = true, IInterceptor? interceptor = null) =>
        new(folder, new FakeTimeProvider(new DateTimeOffset(2026, 3, 1, 9, 30, 0, TimeSpan.Zero)), removes, interceptor);

    public T Get<T>()
        where T : notnull => services.GetRequiredService<T>();

    public Task StartAgainAsync() => Get<StoreStartup>().StartAsync(Cancellation);

    /// <summary>Ends it as a stopped server does, keeps the folder, and gives a store on it that is not started.</summary>
    public async Task<TestStore> ReopenAsync()
    {
        await services.DisposeAsync();
        SqliteConnection.ClearAllPools();
        return Unstarted(Folder);
    }

    /// <summary>Changes the database from outside, as somebody with access to the file could.</summary>
    public int Sql(string sql)
    {
        using var connection = Open(Paths.Database);
        return Execute(connection, sql);
    }

    /// <summary>Changes it from outside with the triggers out of the way.</summary>
    public int SqlWithoutTriggers(string sql)
    {
        using var connection = Open(Paths.Database);
        var triggers = new List<string>();
        using (var reader = Command(connection, "SELECT name FROM sqlite_master WHERE type = 'trigger'").ExecuteReader())
        {
            while (reader.Read())
            {
                triggers.Add(reader.GetString(0));
            }
        }

        triggers.ForEach(t => Execute(connection, $"DROP TRIGGER {t}"));
        var changed = Execute(connection, sql);
        Sqlite.Schema.AppendOnlyTriggers.Ensure(connection);
        return changed;
    }

    public object? Value(string sql)
    {
        using var connection = Open(Paths.Database);
        using var command = Command(connection, sql);
        return command.ExecuteScalar();
    }

    public async ValueTask DisposeAsync()
    {
        await services.DisposeAsync();
        SqliteConnection.ClearAllPools();
        if (removes && Directory.Exists(Folder))
        {
            Directory.Delete(Folder, recursive: true);
        }
    }

    public static SqliteConnection Open(string file)
    {
        var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = file, Pooling = false }.ToString());
        connection.Open();
        return connection;
    }

    public static int Execute(SqliteConnection connection, string sql)
    {
        using var command = Command(connection, sql);
        return command.ExecuteNonQuery();
    }

    private static SqliteCommand Command(SqliteConnection connection, string sql)
    {
        var command = connection.CreateCommand();
#pragma warning disable CA2100 // written in the tests
        command.CommandText = sql;
#pragma warning restore CA2100
        return command;
    }
}
