using ModelLab.Intake.Csv;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.People;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Sources;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Web.Features.Demo;

/// <summary>One person at work in the demo project.</summary>
/// <param name="uses">The use cases.</param>
/// <param name="projectId">The project.</param>
/// <param name="person">Who.</param>
public sealed class DemoActor(DemoUseCases uses, string projectId, Person person)
{
    private readonly Caller caller = new(person.Id);

    /// <summary>Uploads one of the tables that travel in the program.</summary>
    public async Task<DatasetView> UploadAsync(string table, string? corrects, string? reason, CancellationToken cancellation)
    {
        await using var content = DemoTables.Open(table);
        var request = new SourceRequest(table, new CsvOptions(), false, corrects, reason);
        return (await uses.Receive.ExecuteAsync(caller, projectId, request, content, cancellation)).Dataset;
    }

    /// <summary>Describes a variable.</summary>
    public async Task<VariableView> DescribeAsync(DatasetView dataset, string variable, VariableChange change, CancellationToken cancellation) =>
        (await uses.Describe.ExecuteAsync(caller, projectId, dataset.Id, variable, change, cancellation)).Variable;

    /// <summary>Starts a path and gives it with its first revision.</summary>
    public async Task<PathReading> StartAsync(StartRequest request, CancellationToken cancellation) =>
        await PathAsync(await uses.Start.ExecuteAsync(caller, projectId, request, cancellation), cancellation);

    /// <summary>Runs a path again on a corrected dataset.</summary>
    public async Task<PathReading> RunAgainAsync(PathReading path, AgainRequest request, CancellationToken cancellation) =>
        await PathAsync(await uses.RunAgain.ExecuteAsync(caller, projectId, path.Path.Id, request, cancellation), cancellation);

    /// <summary>Takes a term out of the last revision.</summary>
    public Task<RevisionReading> RemoveAsync(RevisionReading last, string variable, string reason, CancellationToken cancellation) =>
        uses.Decide.ExecuteAsync(
            caller, projectId, last.PathId, new DecisionRequest(DecisionKind.Remove, new VariableTerm(variable), null, null, null, reason, last.Id), preview: false, cancellation);

    /// <summary>Makes a remark.</summary>
    public Task<CommentView> RemarkAsync(Place place, string text, CancellationToken cancellation) =>
        uses.Comments.MakeAsync(caller, projectId, place, text, cancellation);

    /// <summary>Replies to a remark.</summary>
    public Task<CommentView> ReplyAsync(CommentView comment, string text, CancellationToken cancellation) =>
        uses.Comments.ReplyAsync(caller, projectId, comment.Id, text, cancellation);

    /// <summary>Settles a remark.</summary>
    public Task<CommentView> SettleAsync(CommentView comment, string reason, CancellationToken cancellation) =>
        uses.Comments.SettleAsync(caller, projectId, comment.Id, reason, cancellation);

    /// <summary>Accepts the open finding of a rule at a revision.</summary>
    /// <exception cref="InvalidOperationException">The rule raised none there: data and story do not go together.</exception>
    public async Task AcceptAsync(RevisionReading revision, string rule, string reason, CancellationToken cancellation)
    {
        var finding = revision.Findings.FirstOrDefault(f => f.Finding.Rule == rule && f.State == FindingState.Open)?.Id
            ?? throw new InvalidOperationException($"Revision {revision.Number} of the demo has no open finding of the rule {rule}.");
        await uses.Findings.AcceptAsync(caller, projectId, finding, reason, cancellation);
    }

    private Task<PathReading> PathAsync(string pathId, CancellationToken cancellation) => uses.Read.PathAsync(caller, projectId, pathId, cancellation);
}
