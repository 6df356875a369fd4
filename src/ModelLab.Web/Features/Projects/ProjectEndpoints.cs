using System.Security.Claims;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Opening;
using ModelLab.Projects.People;
using ModelLab.Projects.Views;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Projects;

/// <summary>Projects: open, list, look.</summary>
public static class ProjectEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapProjects(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects").WithTags("Projects");
        group.MapPost(string.Empty, async (ProjectRequest request, ClaimsPrincipal user, OpenProject open, CancellationToken cancellation) =>
                Results.Json(await open.ExecuteAsync(user.ToCaller(), request.Name, request.Question, cancellation), statusCode: StatusCodes.Status201Created))
            .WithName("OpenProject")
            .WithSummary("Opens a project; you become its owner.")
            .Produces<ProjectView>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 422);
        group.MapGet(string.Empty, async (ClaimsPrincipal user, ReadProjects read, CancellationToken cancellation) =>
                TypedResults.Ok(await read.AllAsync(user.ToCaller(), cancellation)))
            .WithName("ListProjects")
            .WithSummary("The projects of which you are a member, oldest first.");
        group.MapGet("/{project}", async (string project, ClaimsPrincipal user, ReadProjects read, CancellationToken cancellation) =>
                TypedResults.Ok(ProjectAnswer.Of(await read.OneAsync(user.ToCaller(), project, cancellation))))
            .WithName("ReadProject")
            .WithSummary("One project with where it stands: people, datasets, paths, what is open.")
            .WithProblems(404);
    }
}

/// <summary>A project to be opened.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Question">What it is to answer: outcome, population, use of the result.</param>
public sealed record ProjectRequest(string? Name, string? Question);

/// <summary>A project with where it stands.</summary>
/// <param name="Id">Its id.</param>
/// <param name="Name">Its name.</param>
/// <param name="Question">What it is to answer.</param>
/// <param name="OpenedAt">When it was opened.</param>
/// <param name="OpenedBy">By whom.</param>
/// <param name="Role">Your role.</param>
/// <param name="People">Members with their roles.</param>
/// <param name="Datasets">Datasets, oldest first.</param>
/// <param name="Paths">Model paths, oldest first.</param>
/// <param name="OpenComments">Comments not settled, replies not counted.</param>
/// <param name="OpenFindings">Findings that nobody answered.</param>
/// <param name="Entries">Entries of the ledger.</param>
public sealed record ProjectAnswer(
    string Id, string Name, string Question, DateTimeOffset OpenedAt, Author OpenedBy, Role Role, IReadOnlyList<MemberView> People,
    IReadOnlyList<DatasetView> Datasets, IReadOnlyList<PathView> Paths, int OpenComments, int OpenFindings, long Entries)
{
    /// <summary>The answer for a project.</summary>
    public static ProjectAnswer Of(ProjectStanding standing) => new(
        standing.Project.Id, standing.Project.Name, standing.Project.Question, standing.Project.OpenedAt, standing.Project.OpenedBy, standing.Role,
        standing.Members, standing.Datasets, standing.Paths, standing.OpenComments, standing.OpenFindings, standing.Entries);
}
