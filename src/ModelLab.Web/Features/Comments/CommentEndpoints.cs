using System.Security.Claims;
using ModelLab.Projects.Comments;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Views;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Comments;

/// <summary>Comments on exact places.</summary>
public static class CommentEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapComments(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects/{project}/comments").WithTags("Comments");
        group.MapPost(string.Empty, async (string project, CommentRequest request, ClaimsPrincipal user, ManageComments comments, CancellationToken cancellation) =>
                Results.Json(await comments.MakeAsync(user.ToCaller(), project, request.Place, request.Text, cancellation), statusCode: StatusCodes.Status201Created))
            .WithName("MakeComment")
            .WithSummary("Makes a comment at a revision, a term at a revision, a data decision, a variable, or the project.")
            .Produces<CommentView>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 404, 422);
        group.MapGet(string.Empty, async (string project, ClaimsPrincipal user, ManageComments comments, CancellationToken cancellation) =>
                TypedResults.Ok(await comments.AllAsync(user.ToCaller(), project, cancellation)))
            .WithName("ListComments")
            .WithSummary("All comments of a project with their replies, oldest first.")
            .WithProblems(404);
        group.MapPost("/{comment}/replies", async (string project, string comment, ReplyRequest request, ClaimsPrincipal user, ManageComments comments, CancellationToken cancellation) =>
                Results.Json(await comments.ReplyAsync(user.ToCaller(), project, comment, request.Text, cancellation), statusCode: StatusCodes.Status201Created))
            .WithName("ReplyToComment")
            .WithSummary("Replies to a comment that is open.")
            .Produces<CommentView>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 404, 409, 422);
        group.MapPost("/{comment}/settle", async (string project, string comment, ReasonRequest request, ClaimsPrincipal user, ManageComments comments, CancellationToken cancellation) =>
                Results.Json(await comments.SettleAsync(user.ToCaller(), project, comment, request.Reason, cancellation), statusCode: StatusCodes.Status201Created))
            .WithName("SettleComment")
            .WithSummary("Settles a comment with all its replies, with a reason.")
            .Produces<CommentView>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 404, 409, 422);
    }
}

/// <summary>A comment to be made.</summary>
/// <param name="Place">What it is about.</param>
/// <param name="Text">The comment.</param>
public sealed record CommentRequest(Place? Place, string? Text);

/// <summary>A reply to be made.</summary>
/// <param name="Text">The reply.</param>
public sealed record ReplyRequest(string? Text);
