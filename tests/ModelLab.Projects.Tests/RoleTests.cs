using System.Reflection;
using ModelLab.Intake.Csv;
using ModelLab.Projects.Comments;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Opening;
using ModelLab.Projects.Paths;
using ModelLab.Projects.People;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Records;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Sources;
using ModelLab.Projects.Tests.Hosting;

namespace ModelLab.Projects.Tests;

/// <summary>Every call asks who is calling. One table holds every public method that takes a caller; a test finds those forgotten.</summary>
public sealed class RoleTests : IDisposable
{
    private static readonly CancellationToken None = CancellationToken.None;

    private static readonly Dictionary<string, Attempt> Attempts = new()
    {
        ["ReadProjects.OneAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadProjects>().OneAsync(c, p, None)),
        ["ManageMembers.AddAsync"] = new(Role.Owner, (b, c, p) => b.Get<ManageMembers>().AddAsync(c, p, "stranger@marrowvale.example", Role.Reader, "why", None)),
        ["ManageMembers.ChangeRoleAsync"] = new(Role.Owner, (b, c, p) => b.Get<ManageMembers>().ChangeRoleAsync(c, p, "reader", Role.Reader, "why", None)),
        ["ManageMembers.RemoveAsync"] = new(Role.Owner, (b, c, p) => b.Get<ManageMembers>().RemoveAsync(c, p, "nobody", "why", None)),
        ["ReceiveSource.ExecuteAsync"] = new(Role.Analyst, (b, c, p) => b.Get<ReceiveSource>().ExecuteAsync(c, p, new SourceRequest(null, new CsvOptions(), false, null, null), Stream.Null, None)),
        ["ReadSources.AllAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadSources>().AllAsync(c, p, None)),
        ["ReadSources.OpenAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadSources>().OpenAsync(c, p, "none", None)),
        ["ReadDataset.ExecuteAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadDataset>().ExecuteAsync(c, p, "none", None)),
        ["ReadDataset.CorrelationsAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadDataset>().CorrelationsAsync(c, p, "none", None)),
        ["DescribeVariable.ExecuteAsync"] = new(Role.Analyst, (b, c, p) => b.Get<DescribeVariable>().ExecuteAsync(c, p, "none", "x", new VariableChange(null, null, null, null, null, null, null), None)),
        ["MakePreparation.ExecuteAsync"] = new(Role.Analyst, (b, c, p) => b.Get<MakePreparation>().ExecuteAsync(c, p, new PreparationRequest(null, null, null), false, None)),
        ["MakePreparation.AllAsync"] = new(Role.Reader, (b, c, p) => b.Get<MakePreparation>().AllAsync(c, p, None)),
        ["MakePreparation.OneAsync"] = new(Role.Reader, (b, c, p) => b.Get<MakePreparation>().OneAsync(c, p, "none", None)),
        ["StartPath.ExecuteAsync"] = new(Role.Analyst, (b, c, p) => b.Get<StartPath>().ExecuteAsync(c, p, Bench.Start("none", "y", "x"), None)),
        ["TakeDecision.ExecuteAsync"] = new(Role.Analyst, (b, c, p) => b.Get<TakeDecision>().ExecuteAsync(c, p, "none", new DecisionRequest(null, null, null, null, null, null, null), false, None)),
        ["ChooseByRule.ExecuteAsync"] = new(Role.Analyst, (b, c, p) => b.Get<ChooseByRule>().ExecuteAsync(c, p, "none", new ChooseRequest(null, null), false, None)),
        ["RunPathAgain.ExecuteAsync"] = new(Role.Analyst, (b, c, p) => b.Get<RunPathAgain>().ExecuteAsync(c, p, "none", new AgainRequest(null, null, null), None)),
        ["ReadRevision.OneAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadRevision>().OneAsync(c, p, "none", None)),
        ["ReadRevision.PathAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadRevision>().PathAsync(c, p, "none", None)),
        ["ReadRevision.PathsAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadRevision>().PathsAsync(c, p, None)),
        ["ReadRevision.RowsAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadRevision>().RowsAsync(c, p, "none", None)),
        ["ManageComments.AllAsync"] = new(Role.Reader, (b, c, p) => b.Get<ManageComments>().AllAsync(c, p, None)),
        ["ManageComments.MakeAsync"] = new(Role.Reviewer, (b, c, p) => b.Get<ManageComments>().MakeAsync(c, p, null, null, None)),
        ["ManageComments.ReplyAsync"] = new(Role.Reviewer, (b, c, p) => b.Get<ManageComments>().ReplyAsync(c, p, "none", null, None)),
        ["ManageComments.SettleAsync"] = new(Role.Reviewer, (b, c, p) => b.Get<ManageComments>().SettleAsync(c, p, "none", null, None)),
        ["ManageFindings.AllAsync"] = new(Role.Reader, (b, c, p) => b.Get<ManageFindings>().AllAsync(c, p, None)),
        ["ManageFindings.AcceptAsync"] = new(Role.Reviewer, (b, c, p) => b.Get<ManageFindings>().AcceptAsync(c, p, "none", null, None)),
        ["ReadLedger.PageAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadLedger>().PageAsync(c, p, 1, None)),
        ["ReadLedger.VerifyAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadLedger>().VerifyAsync(c, p, None)),
        ["ReadLedger.HeadAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReadLedger>().HeadAsync(c, p, None)),
        ["ReplayProject.ExecuteAsync"] = new(Role.Reader, (b, c, p) => b.Get<ReplayProject>().ExecuteAsync(c, p, None)),
    };

    private readonly Bench bench = new();

    public static TheoryData<string> Names => [.. Attempts.Keys];

    public void Dispose() => bench.Dispose();

    [Fact]
    public void Every_method_that_takes_a_caller_is_in_the_table()
    {
        // Without a project: nothing to be a member of. The gate itself is what all others call.
        string[] beside = ["OpenProject.ExecuteAsync", "ReadProjects.AllAsync", "ProjectGate.PersonAsync", "ProjectGate.EnterAsync"];
        var methods = typeof(OpenProject).Assembly.GetExportedTypes()
            .SelectMany(t => t.GetMethods(BindingFlags.Public | BindingFlags.Instance | BindingFlags.Static | BindingFlags.DeclaredOnly))
            .Where(m => m.DeclaringType != typeof(Caller) && m.GetParameters().Any(p => p.ParameterType == typeof(Caller)))
            .Select(m => $"{m.DeclaringType!.Name}.{m.Name}")
            .Distinct()
            .ToList();
        Assert.Equal(methods.Order(StringComparer.Ordinal), Attempts.Keys.Concat(beside).Order(StringComparer.Ordinal));
    }

    [Theory]
    [MemberData(nameof(Names))]
    public async Task A_smaller_role_is_refused_and_the_needed_one_is_let_in(string name)
    {
        var project = await bench.ProjectAsync();
        var attempt = Attempts[name];
        foreach (var role in Enum.GetValues<Role>())
        {
#pragma warning disable CA1308 // ids of the test's people
            var refused = await RefusalAsync(attempt, new Caller(role.ToString().ToLowerInvariant()), project);
#pragma warning restore CA1308
            Assert.Equal(role < attempt.Needed, refused?.Kind == RefusalKind.Forbidden);
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public async Task A_stranger_learns_nothing(string name)
    {
        var project = await bench.ProjectAsync();
        var refused = await RefusalAsync(Attempts[name], new Caller("stranger"), project);
        Assert.Equal(RefusalKind.NotFound, refused?.Kind);
        Assert.Contains("such project", refused!.Message, StringComparison.Ordinal);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public async Task A_disabled_person_and_a_reading_token_are_refused(string name)
    {
        var project = await bench.ProjectAsync();
        var attempt = Attempts[name];
        if (attempt.Needed > Role.Reader)
        {
            var reading = await RefusalAsync(attempt, new Caller("owner", MayWrite: false), project);
            Assert.Equal(RefusalKind.Forbidden, reading?.Kind);
            Assert.Contains("only read", reading!.Message, StringComparison.Ordinal);
        }

        bench.Store.Add(new Person("owner", "The owner", "owner@marrowvale.example", Active: false, Administrator: false));
        var disabled = await RefusalAsync(attempt, Bench.Owner, project);
        Assert.Equal(RefusalKind.Forbidden, disabled?.Kind);
        Assert.Contains("disabled", disabled!.Message, StringComparison.Ordinal);
    }

    private async Task<RefusedException?> RefusalAsync(Attempt attempt, Caller caller, string project)
    {
        try
        {
            await attempt.Act(bench, caller, project);
            return null;
        }
        catch (RefusedException refused)
        {
            return refused;
        }
    }

    private sealed record Attempt(Role Needed, Func<Bench, Caller, string, Task> Act);
}
