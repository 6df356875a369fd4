using System.Security.Claims;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Revisions;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Paths;

/// <summary>Model paths: start, decide, let the rule choose, run again on corrected data.</summary>
public static class PathEndpoints
{
    private const string Tag = "Model paths";

    /// <summary>Maps the endpoints.</summary>
    public static void MapPaths(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects/{project}/paths").WithTags(Tag);
        group.MapPost(string.Empty, StartAsync)
            .WithName("StartPath")
            .WithSummary("Starts a path with its first revision, or a side path from a revision of another.")
            .Produces<PathAnswer>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 404, 409, 410, 422);
        group.MapGet(string.Empty, async (string project, ClaimsPrincipal user, ReadRevision read, CancellationToken cancellation) =>
                TypedResults.Ok(await read.PathsAsync(user.ToCaller(), project, cancellation)))
            .WithName("ListPaths")
            .WithSummary("All paths of a project, oldest first.")
            .WithProblems(404);
        group.MapGet("/{path}", async (string project, string path, ClaimsPrincipal user, ReadRevision read, CancellationToken cancellation) =>
                TypedResults.Ok(PathAnswer.Of(await read.PathAsync(user.ToCaller(), project, path, cancellation))))
            .WithName("ReadPath")
            .WithSummary("A path with its revisions in order.")
            .WithProblems(404, 410);
        group.MapPost("/{path}/decisions", DecideAsync)
            .WithName("TakeDecision")
            .WithSummary("Takes one decision: a refit and a new revision. With ?preview=true it is computed and not stored.")
            .WithDescription("`after` is the id of the last revision that you have seen. If the path went on meanwhile, the answer is 409 and nothing changes.")
            .Produces<RevisionReading>(StatusCodes.Status201Created)
            .Produces<RevisionReading>()
            .WithProblems(400, 403, 404, 409, 410, 422);
        group.MapPost("/{path}/choose", ChooseAsync)
            .WithName("ChooseByRule")
            .WithSummary("Runs the path's rule to its end: one stored revision a step. With ?preview=true it is computed and not stored.")
            .Produces<ChosenByRule>(StatusCodes.Status201Created)
            .Produces<ChosenByRule>()
            .WithProblems(400, 403, 404, 409, 410, 422);
        group.MapPost("/{path}/again", AgainAsync)
            .WithName("RunPathAgain")
            .WithSummary("Runs the decisions of a path again, in order, on a corrected dataset, as a new path. The old path stays as it is.")
            .Produces<PathAnswer>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 404, 409, 410, 422);
    }

    private static async Task<IResult> StartAsync(
        string project, StartRequest request, ClaimsPrincipal user, StartPath start, ReadRevision read, CancellationToken cancellation)
    {
        var id = await start.ExecuteAsync(user.ToCaller(), project, request, cancellation);
        return await CreatedAsync(project, id, user, read, cancellation);
    }

    private static async Task<IResult> AgainAsync(
        string project, string path, AgainRequest request, ClaimsPrincipal user, RunPathAgain again, ReadRevision read, CancellationToken cancellation)
    {
        var id = await again.ExecuteAsync(user.ToCaller(), project, path, request, cancellation);
        return await CreatedAsync(project, id, user, read, cancellation);
    }

    private static async Task<IResult> DecideAsync(
        string project, string path, DecisionRequest request, bool? preview, ClaimsPrincipal user, TakeDecision take, CancellationToken cancellation) =>
        Results.Json(
            await take.ExecuteAsync(user.ToCaller(), project, path, request, preview == true, cancellation),
            statusCode: preview == true ? StatusCodes.Status200OK : StatusCodes.Status201Created);

    private static async Task<IResult> ChooseAsync(
        string project, string path, ChooseRequest request, bool? preview, ClaimsPrincipal user, ChooseByRule choose, CancellationToken cancellation) =>
        Results.Json(
            await choose.ExecuteAsync(user.ToCaller(), project, path, request, preview == true, cancellation),
            statusCode: preview == true ? StatusCodes.Status200OK : StatusCodes.Status201Created);

    private static async Task<IResult> CreatedAsync(string project, string id, ClaimsPrincipal user, ReadRevision read, CancellationToken cancellation) =>
        Results.Json(PathAnswer.Of(await read.PathAsync(user.ToCaller(), project, id, cancellation)), statusCode: StatusCodes.Status201Created);
}

/// <summary>A path with its revisions.</summary>
/// <param name="Id">Its id.</param>
/// <param name="Name">Its name.</param>
/// <param name="Plan">What it fixes for all its revisions.</param>
/// <param name="FromRevisionId">For a side path: the revision that it leaves; else null.</param>
/// <param name="AgainOfPathId">The path that it runs again, or null.</param>
/// <param name="Reason">Why it was started.</param>
/// <param name="StartedAt">When.</param>
/// <param name="StartedBy">By whom.</param>
/// <param name="LastRevisionId">Its last revision: the <c>after</c> of the next decision.</param>
/// <param name="Revisions">The revisions in order.</param>
public sealed record PathAnswer(
    string Id, string Name, PathPlan Plan, string? FromRevisionId, string? AgainOfPathId, string Reason, DateTimeOffset StartedAt, Author StartedBy,
    string? LastRevisionId, IReadOnlyList<RevisionReading> Revisions)
{
    /// <summary>The answer for a path.</summary>
    public static PathAnswer Of(PathReading reading) => new(
        reading.Path.Id, reading.Path.Name, reading.Path.Plan, reading.Path.FromRevisionId, reading.Path.AgainOfPathId, reading.Path.Reason,
        reading.Path.StartedAt, reading.Path.StartedBy, reading.Path.LastRevisionId, reading.Revisions);
}
