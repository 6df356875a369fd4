using Microsoft.Extensions.DependencyInjection;
using ModelLab.Projects;
using ModelLab.Projects.Opening;
using ModelLab.Projects.People;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Views;
using ModelLab.Store;
using ModelLab.Store.Sqlite;
using ModelLab.Store.Sqlite.Starting;
using ModelLab.Web.Features.Demo;
using Xunit;

namespace ModelLab.Web.Tests.Features.Demo;

/// <summary>The demo project, made once in a store of its own.</summary>
public sealed class LoadedDemo : IAsyncLifetime
{
    private readonly DirectoryInfo folder = Directory.CreateTempSubdirectory("modellab-demo-");
    private ServiceProvider? services;

    public Person Analyst { get; private set; } = null!;

    public Caller Caller => new(Analyst.Id);

    public ProjectView Project { get; private set; } = null!;

    public IReadOnlyList<PathReading> Paths { get; private set; } = [];

    public T Use<T>()
        where T : notnull => services!.GetRequiredService<T>();

    public PathReading Path(string letter) => Paths.Single(p => p.Path.Name.StartsWith(letter + ":", StringComparison.Ordinal));

    public async ValueTask InitializeAsync()
    {
        services = new ServiceCollection()
            .AddModelLabSqliteStore(new StoreSettings { DataFolder = folder.FullName })
            .AddModelLabProjects()
            .AddDemo()
            .BuildServiceProvider();
        await Use<StoreStartup>().StartAsync(CancellationToken.None);
        await Use<IDemoLoader>().LoadAsync(CancellationToken.None);
        Analyst = (await Use<IPeople>().FindByEmailAsync(DemoPeople.AnalystEmail, CancellationToken.None))!;
        Project = Assert.Single(await Use<ReadProjects>().AllAsync(Caller, CancellationToken.None));
        var paths = new List<PathReading>();
        foreach (var path in await Use<ReadRevision>().PathsAsync(Caller, Project.Id, CancellationToken.None))
        {
            paths.Add(await Use<ReadRevision>().PathAsync(Caller, Project.Id, path.Id, CancellationToken.None));
        }

        Paths = paths;
    }

    public async ValueTask DisposeAsync()
    {
        await services!.DisposeAsync();
        Microsoft.Data.Sqlite.SqliteConnection.ClearAllPools();
        folder.Delete(recursive: true);
    }
}
