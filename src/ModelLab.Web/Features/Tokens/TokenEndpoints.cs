using System.Security.Claims;
using ModelLab.Projects;
using ModelLab.Store.Server;
using ModelLab.Web.Http;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Features.Tokens;

/// <summary>A person's own API tokens.</summary>
public static class TokenEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapTokens(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/tokens").WithTags("API tokens");
        group.MapGet(string.Empty, async (ClaimsPrincipal user, ApiTokens tokens, CancellationToken cancellation) =>
                TypedResults.Ok((await tokens.OfPersonAsync(user.PersonId(), cancellation)).Select(TokenAnswer.Of).ToList()))
            .WithName("ListTokens")
            .WithSummary("Your API tokens, newest first, with the expired and the revoked.");
        group.MapPost(string.Empty, IssueAsync)
            .WithName("IssueToken")
            .WithSummary("Issues an API token for yourself. Its secret is told once. Only for a signed-in session: a token cannot make another.")
            .WithMetadata(new SessionOnly())
            .Produces<IssuedTokenAnswer>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 422);
        group.MapDelete("/{id}", RevokeAsync)
            .WithName("RevokeToken")
            .WithSummary("Revokes one of your API tokens at once.")
            .Produces<TokenAnswer>()
            .WithProblems(404);
    }

    private static async Task<IResult> IssueAsync(
        TokenRequest request, ClaimsPrincipal user, ApiTokens tokens, TokenSettings settings, CancellationToken cancellation)
    {
        var lifetime = TokenLifetime.Of(request.Days, settings);
        var issued = await tokens.IssueAsync(user.PersonId(), user.PersonId(), request.Name, request.Scope, lifetime, cancellation);
        return Results.Json(new IssuedTokenAnswer(issued.Token.Id, issued.Secret, TokenAnswer.Of(issued.Token)), statusCode: StatusCodes.Status201Created);
    }

    private static async Task<IResult> RevokeAsync(string id, ClaimsPrincipal user, ApiTokens tokens, CancellationToken cancellation)
    {
        // Somebody else's token is not known here, not even to an administrator.
        if (!(await tokens.OfPersonAsync(user.PersonId(), cancellation)).Any(t => t.Id == id))
        {
            throw new RefusedException(RefusalKind.NotFound, "You have no such token.");
        }

        return Results.Ok(TokenAnswer.Of(await tokens.RevokeAsync(user.PersonId(), id, cancellation)));
    }
}

/// <summary>For how long a token holds.</summary>
public static class TokenLifetime
{
    /// <summary>The lifetime for a number of days, or the default.</summary>
    /// <exception cref="RefusedException">Too few or too many.</exception>
    public static TimeSpan Of(int? days, TokenSettings settings)
    {
        var wanted = days ?? settings.DefaultDays;
        return wanted >= 1 && wanted <= settings.MaximumDays
            ? TimeSpan.FromDays(wanted)
            : throw RefusedException.Invalid($"A token holds for 1 to {settings.MaximumDays} days; asked for were {wanted}.", "days");
    }
}

/// <summary>A token to be issued.</summary>
/// <param name="Name">What it is for.</param>
/// <param name="Scope">What it may do.</param>
/// <param name="Days">For how many days; null: the server's default.</param>
public sealed record TokenRequest(string Name, TokenScope Scope, int? Days = null);

/// <summary>A token without its secret.</summary>
/// <param name="Id">Id; not secret.</param>
/// <param name="Name">What it is for.</param>
/// <param name="Scope">What it may do.</param>
/// <param name="IssuedAt">When it was issued.</param>
/// <param name="ExpiresAt">From when on it is refused.</param>
/// <param name="RevokedAt">When it was revoked, or null.</param>
/// <param name="LastUsedAt">When it was last used, to the minute, or null.</param>
public sealed record TokenAnswer(
    string Id, string Name, TokenScope Scope, DateTimeOffset IssuedAt, DateTimeOffset ExpiresAt, DateTimeOffset? RevokedAt, DateTimeOffset? LastUsedAt)
{
    /// <summary>The answer for a token.</summary>
    public static TokenAnswer Of(ApiToken token) =>
        new(token.Id, token.Name, token.Scope, token.IssuedAt, token.ExpiresAt, token.RevokedAt, token.LastUsedAt);
}

/// <summary>A token with its secret, which is told this once.</summary>
/// <param name="Id">Id; not secret.</param>
/// <param name="Secret">What to send as <c>Authorization: Bearer</c>.</param>
/// <param name="Token">The token.</param>
public sealed record IssuedTokenAnswer(string Id, string Secret, TokenAnswer Token);
