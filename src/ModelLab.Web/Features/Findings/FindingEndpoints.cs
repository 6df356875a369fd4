using System.Security.Claims;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Views;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Findings;

/// <summary>Findings: what a careful reviewer would raise.</summary>
public static class FindingEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapFindings(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects/{project}/findings").WithTags("Findings");
        group.MapGet(string.Empty, async (string project, ClaimsPrincipal user, ManageFindings findings, CancellationToken cancellation) =>
                TypedResults.Ok(await findings.AllAsync(user.ToCaller(), project, cancellation)))
            .WithName("ListFindings")
            .WithSummary("All findings of a project, oldest first: open, accepted, gone.")
            .WithProblems(404);
        group.MapPost("/{finding}/accept", async (string project, string finding, ReasonRequest request, ClaimsPrincipal user, ManageFindings findings, CancellationToken cancellation) =>
                Results.Json(await findings.AcceptAsync(user.ToCaller(), project, finding, request.Reason, cancellation), statusCode: StatusCodes.Status201Created))
            .WithName("AcceptFinding")
            .WithSummary("Accepts an open finding: it stays on record with the reason why the team lives with it.")
            .Produces<FindingView>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 404, 409, 422);
    }
}
