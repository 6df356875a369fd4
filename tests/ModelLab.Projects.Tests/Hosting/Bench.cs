using System.Text;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Time.Testing;
using ModelLab.Intake.Csv;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Opening;
using ModelLab.Projects.Paths;
using ModelLab.Projects.People;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Sources;
using ModelLab.Projects.Storage;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Tests.Hosting;

/// <summary>The use cases over a store in memory, with an owner, an analyst, a reviewer, a reader and a stranger.</summary>
public sealed class Bench : IDisposable
{
    private readonly ServiceProvider services;

    public Bench()
    {
        Store = new MemoryStore();
        foreach (var name in new[] { "owner", "analyst", "reviewer", "reader", "stranger" })
        {
            Store.Add(new Person(name, $"The {name}", $"{name}@marrowvale.example", true, false));
        }

        services = new ServiceCollection()
            .AddSingleton<IProjectStore>(Store)
            .AddSingleton<ISourceVault>(Store)
            .AddSingleton<IPeople>(Store)
            .AddSingleton<TimeProvider>(Clock)
            .AddModelLabProjects()
            .BuildServiceProvider(validateScopes: true);
    }

    public static Caller Owner { get; } = new("owner");

    public static Caller Analyst { get; } = new("analyst");

    public MemoryStore Store { get; }

    public FakeTimeProvider Clock { get; } = new(new DateTimeOffset(2026, 5, 4, 9, 0, 0, TimeSpan.Zero));

    public static CancellationToken Stop => TestContext.Current.CancellationToken;

    public T Get<T>()
        where T : notnull => services.GetRequiredService<T>();

    public async Task<string> ProjectAsync()
    {
        var project = await Get<OpenProject>().ExecuteAsync(Owner, "Marrow Vale", "How much did each measure save?", Stop);
        var members = Get<ManageMembers>();
        await members.AddAsync(Owner, project.Id, "analyst@marrowvale.example", Role.Analyst, "fits the models", Stop);
        await members.AddAsync(Owner, project.Id, "reviewer@marrowvale.example", Role.Reviewer, "reviews", Stop);
        await members.AddAsync(Owner, project.Id, "reader@marrowvale.example", Role.Reader, "reads", Stop);
        return project.Id;
    }

    public Task<ReceivedSource> SourceAsync(string projectId, string csv, string? previousDatasetId = null, string fileName = "data.csv") =>
        SourceAsync(projectId, Encoding.UTF8.GetBytes(csv), previousDatasetId, fileName);

    public Task<ReceivedSource> SourceAsync(string projectId, byte[] bytes, string? previousDatasetId = null, string fileName = "data.csv") =>
        Get<ReceiveSource>().ExecuteAsync(
            Analyst, projectId, new SourceRequest(fileName, new CsvOptions(), false, previousDatasetId, "the file of the study"), new MemoryStream(bytes), Stop);

    public static StartRequest Start(string datasetId, string outcome, params string[] terms) => new(
        "main", datasetId, null, outcome, [.. terms.Select(t => new VariableTerm(t))], null, null, null, null, null, null, null, "all candidates first");

    public async Task<PathReading> PathAsync(string projectId, StartRequest request)
    {
        var id = await Get<StartPath>().ExecuteAsync(Analyst, projectId, request, Stop);
        return await Get<ReadRevision>().PathAsync(Analyst, projectId, id, Stop);
    }

    public Task<RevisionReading> DecideAsync(string projectId, RevisionReading after, DecisionKind kind, string? term = null, bool preview = false, string reason = "a reason") =>
        Get<TakeDecision>().ExecuteAsync(
            Analyst, projectId, after.PathId, new DecisionRequest(kind, term is null ? null : new VariableTerm(term), null, null, null, reason, after.Id), preview, Stop);

    public static byte[] Fixture(string name)
    {
        using var stream = typeof(Bench).Assembly.GetManifestResourceStream($"ModelLab.Projects.Tests.Fixtures.{name}")
            ?? throw new InvalidOperationException($"There is no fixture {name}.");
        using var buffer = new MemoryStream();
        stream.CopyTo(buffer);
        return buffer.ToArray();
    }

    public void Dispose() => services.Dispose();
}
