using Microsoft.Extensions.DependencyInjection;
using ModelLab.Intake.Csv;
using ModelLab.Projects;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Opening;
using ModelLab.Projects.Paths;
using ModelLab.Projects.People;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Sources;
using ModelLab.Statistics.Selection;
using ModelLab.Store;
using ModelLab.Store.Server;
using ModelLab.Store.Sqlite;
using ModelLab.Store.Sqlite.Starting;

namespace ModelLab.Benchmarks;

/// <summary>The same elimination as a person meets it: a path through the use cases, every revision in the ledger of a store on disk.</summary>
public sealed class StoredElimination : IAsyncDisposable
{
    private readonly ServiceProvider services;
    private readonly RegressionData data;
    private readonly Caller caller;
    private readonly string projectId;
    private readonly string datasetId;
    private int paths;

    /// <summary>Makes the store and takes the data in.</summary>
    public StoredElimination(RegressionData data, string folder)
    {
        this.data = data;
        services = new ServiceCollection().AddModelLabSqliteStore(new StoreSettings { DataFolder = folder }).AddModelLabProjects().BuildServiceProvider();
        Wait(Use<StoreStartup>().StartAsync(default));
        var person = Wait(Use<ServerRecords>().EnrolAsync(ServerRecords.CommandLineActor, "Benchmark", "benchmark@example.org", false, default)).Person;
        caller = new Caller(person.Id);
        projectId = Wait(Use<OpenProject>().ExecuteAsync(caller, "Benchmark", "How long does it take?", default)).Id;
        var source = new SourceRequest("benchmark.csv", new CsvOptions(), true, null, null);
        datasetId = Wait(Use<ReceiveSource>().ExecuteAsync(caller, projectId, source, new MemoryStream(data.ToCsv()), default)).Dataset.Id;
    }

    /// <summary>Revisions of the last run.</summary>
    public int Revisions { get; private set; }

    /// <summary>Starts a path with all terms and lets the rule run to its end.</summary>
    public void Run()
    {
        var rule = new RuleRecord(ChoosingDirection.Backward, Criterion.P, Fitting.Rule.RemoveAbove);
        var start = new StartRequest($"Path {++paths}", datasetId, null, "y", data.Terms, null, null, rule, null, null, null, null, "Timing.");
        var path = Wait(Use<StartPath>().ExecuteAsync(caller, projectId, start, default));
        var first = Wait(Use<ReadRevision>().PathAsync(caller, projectId, path, default)).Revisions[0];
        Revisions = 1 + Wait(Use<ChooseByRule>().ExecuteAsync(caller, projectId, path, new ChooseRequest("Timing.", first.Id), false, default)).Revisions.Count;
    }

    /// <summary>Closes the store.</summary>
    public ValueTask DisposeAsync() => services.DisposeAsync();

    private static void Wait(Task task) => task.GetAwaiter().GetResult();

    private static T Wait<T>(Task<T> task) => task.GetAwaiter().GetResult();

    private T Use<T>()
        where T : notnull => services.GetRequiredService<T>();
}
