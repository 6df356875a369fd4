using System.Security.Claims;
using ModelLab.Projects;
using ModelLab.Projects.Opening;
using ModelLab.Projects.People;
using ModelLab.Projects.Views;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Projects;

/// <summary>The people of a project and their roles.</summary>
public static class MemberEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapMembers(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects/{project}/people").WithTags("People of a project");
        group.MapGet(string.Empty, async (string project, ClaimsPrincipal user, ReadProjects read, CancellationToken cancellation) =>
                TypedResults.Ok((await read.OneAsync(user.ToCaller(), project, cancellation)).Members))
            .WithName("ListMembers")
            .WithSummary("The members of a project with their roles.")
            .WithProblems(404);
        group.MapPost(string.Empty, async (string project, MemberRequest request, ClaimsPrincipal user, ManageMembers members, CancellationToken cancellation) =>
                Results.Json(
                    await members.AddAsync(user.ToCaller(), project, request.Email, Given(request.Role), request.Reason, cancellation),
                    statusCode: StatusCodes.Status201Created))
            .WithName("AddMember")
            .WithSummary("Adds a person who has an account on this server. For owners.")
            .Produces<MemberView>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 404, 409, 422);
        group.MapPatch("/{person}", async (string project, string person, RoleChange change, ClaimsPrincipal user, ManageMembers members, CancellationToken cancellation) =>
                TypedResults.Ok(await members.ChangeRoleAsync(user.ToCaller(), project, person, Given(change.Role), change.Reason, cancellation)))
            .WithName("ChangeMemberRole")
            .WithSummary("Changes a member's role. For owners; a project keeps at least one.")
            .WithProblems(400, 403, 404, 409, 422);
        group.MapDelete("/{person}", async (string project, string person, string? reason, ClaimsPrincipal user, ManageMembers members, CancellationToken cancellation) =>
            {
                await members.RemoveAsync(user.ToCaller(), project, person, reason, cancellation);
                return TypedResults.NoContent();
            })
            .WithName("RemoveMember")
            .WithSummary("Ends a membership, with a reason as ?reason=. What the person did stays on record. For owners.")
            .WithProblems(403, 404, 409, 422);
    }

    private static Role Given(Role? role) => role ?? throw RefusedException.Invalid("Give a role: reader, reviewer, analyst or owner.", "role");
}

/// <summary>A person to be made a member.</summary>
/// <param name="Email">E-mail address of the account.</param>
/// <param name="Role">Role in the project.</param>
/// <param name="Reason">Why.</param>
public sealed record MemberRequest(string? Email, Role? Role, string? Reason);

/// <summary>A change of a member's role.</summary>
/// <param name="Role">The role from now on.</param>
/// <param name="Reason">Why.</param>
public sealed record RoleChange(Role? Role, string? Reason);
