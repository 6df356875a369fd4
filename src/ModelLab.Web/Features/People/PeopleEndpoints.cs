using System.Security.Claims;
using ModelLab.Projects;
using ModelLab.Projects.People;
using ModelLab.Store.Server;
using ModelLab.Web.Features.SignIn;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.People;

/// <summary>Who you are, and, for administrators, the people of the server.</summary>
public static class PeopleEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapPeople(this IEndpointRouteBuilder api)
    {
        api.MapGet("/me", async (ClaimsPrincipal user, IPeople people, CancellationToken cancellation) =>
                TypedResults.Ok(new MeAnswer(
                    PersonAnswer.Of(await ActiveAsync(people, user, cancellation)),
                    user.ToCaller().MayWrite ? TokenScope.Write : TokenScope.Read,
                    user.TokenExpiry())))
            .WithTags("People of the server")
            .WithName("Me")
            .WithSummary("Who you are on this server, and what your token or session may do.");

        var group = api.MapGroup("/people").WithTags("People of the server");
        group.MapGet(string.Empty, ListAsync)
            .WithName("ListPeople")
            .WithSummary("All people with an account, by name. For administrators.")
            .Produces<IReadOnlyList<PersonAnswer>>()
            .WithProblems(403);
        group.MapPost(string.Empty, EnrolAsync)
            .WithName("EnrolPerson")
            .WithSummary("Makes an account and an invitation to hand over. For administrators.")
            .Produces<InvitationAnswer>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 409, 422);
        group.MapPost("/{id}/invitation", async (string id, ClaimsPrincipal user, ServerRecords records, CancellationToken cancellation) =>
                Results.Json(InvitationAnswer.Of(await records.InviteAgainAsync(user.PersonId(), id, cancellation)), statusCode: StatusCodes.Status201Created))
            .WithName("InvitePersonAgain")
            .WithSummary("Gives a person a new invitation, e.g. after a forgotten password; an earlier one no longer holds. For administrators.")
            .Produces<InvitationAnswer>(StatusCodes.Status201Created)
            .WithProblems(403, 404, 409);
        group.MapPatch("/{id}", ChangeAsync)
            .WithName("ChangePerson")
            .WithSummary("Disables a person, or enables one again. Sessions and tokens of a disabled person hold no longer. For administrators.")
            .Produces<PersonAnswer>()
            .WithProblems(400, 403, 404, 409, 422);
    }

    private static async Task<IResult> ListAsync(ClaimsPrincipal user, IPeople people, ServerRecords records, CancellationToken cancellation)
    {
        if (!(await ActiveAsync(people, user, cancellation)).Administrator)
        {
            throw new RefusedException(RefusalKind.Forbidden, "Only an administrator of this server may do this.");
        }

        return Results.Ok((await records.PeopleAsync(cancellation)).Select(PersonAnswer.Of).ToList());
    }

    private static async Task<IResult> EnrolAsync(EnrolmentRequest request, ClaimsPrincipal user, ServerRecords records, CancellationToken cancellation)
    {
        var invitation = await records.EnrolAsync(user.PersonId(), request.Name, request.Email, request.Administrator, cancellation);
        return Results.Json(InvitationAnswer.Of(invitation), statusCode: StatusCodes.Status201Created);
    }

    private static async Task<IResult> ChangeAsync(string id, PersonChange change, ClaimsPrincipal user, ServerRecords records, CancellationToken cancellation)
    {
        var person = change.Active
            ? await records.EnableAsync(user.PersonId(), id, change.Reason, cancellation)
            : await records.DisableAsync(user.PersonId(), id, change.Reason, cancellation);
        return Results.Ok(PersonAnswer.Of(person));
    }

    private static async Task<Person> ActiveAsync(IPeople people, ClaimsPrincipal user, CancellationToken cancellation) =>
        await people.FindAsync(user.PersonId(), cancellation) is { Active: true } person
            ? person
            : throw new RefusedException(RefusalKind.Forbidden, "This account is disabled. Ask an administrator of the server.");
}

/// <summary>Who calls.</summary>
/// <param name="Person">The person.</param>
/// <param name="Scope">What the token may do; a session may write.</param>
/// <param name="ExpiresAt">When the token expires; null for a session.</param>
public sealed record MeAnswer(PersonAnswer Person, TokenScope Scope, DateTimeOffset? ExpiresAt);

/// <summary>A person to be given an account.</summary>
/// <param name="Name">Printed name.</param>
/// <param name="Email">Address by which the person will sign in.</param>
/// <param name="Administrator">Whether the person may manage the people of the server.</param>
public sealed record EnrolmentRequest(string Name, string Email, bool Administrator = false);

/// <summary>A change of a person's account.</summary>
/// <param name="Active">False disables.</param>
/// <param name="Reason">Why.</param>
public sealed record PersonChange(bool Active, string Reason);

/// <summary>An invitation, whose secret is told this once.</summary>
/// <param name="Id">Id of the person.</param>
/// <param name="Person">Who is invited.</param>
/// <param name="Address">Where the invitation is taken up, from the root of the server.</param>
/// <param name="ExpiresAt">From when on it is refused.</param>
public sealed record InvitationAnswer(string Id, PersonAnswer Person, string Address, DateTimeOffset ExpiresAt)
{
    /// <summary>The answer for an invitation.</summary>
    public static InvitationAnswer Of(Invitation invitation) =>
        new(invitation.Person.Id, PersonAnswer.Of(invitation.Person), $"/invitations/{invitation.Secret}", invitation.ExpiresAt);
}
