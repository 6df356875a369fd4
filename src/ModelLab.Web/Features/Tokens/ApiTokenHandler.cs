using System.Security.Claims;
using System.Text.Encodings.Web;
using Microsoft.AspNetCore.Authentication;
using Microsoft.Extensions.Options;
using ModelLab.Store.Server;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Tokens;

/// <summary>Options of <see cref="ApiTokenHandler"/>; there are none of its own.</summary>
public sealed class ApiTokenOptions : AuthenticationSchemeOptions;

/// <summary>Authenticates <c>Authorization: Bearer TOKEN</c> (RFC 6750). The token and its person are asked of the store anew at each request.</summary>
public sealed class ApiTokenHandler(IOptionsMonitor<ApiTokenOptions> options, ILoggerFactory logger, UrlEncoder encoder, ApiTokens tokens)
    : AuthenticationHandler<ApiTokenOptions>(options, logger, encoder)
{
    /// <summary>Name of the scheme.</summary>
    public const string SchemeName = "ApiToken";

    private const string Prefix = "Bearer ";
    private const int LongestToken = 200;

    /// <inheritdoc/>
    protected override async Task<AuthenticateResult> HandleAuthenticateAsync()
    {
        var header = Request.Headers.Authorization;
        if (header.Count == 0)
        {
            return AuthenticateResult.NoResult();
        }

        var text = header.ToString();
        if (header.Count > 1 || !text.StartsWith(Prefix, StringComparison.OrdinalIgnoreCase) || text.Length > LongestToken)
        {
            return AuthenticateResult.Fail("The Authorization header has to be: Bearer TOKEN.");
        }

        var holder = await tokens.FindHolderAsync(text[Prefix.Length..].Trim(), Context.RequestAborted);
        if (holder is null)
        {
            return AuthenticateResult.Fail("This token is not known, was revoked, has expired, or its person is disabled.");
        }

        var identity = new ClaimsIdentity(
            [
                new Claim(ClaimTypes.NameIdentifier, holder.Person.Id),
                new Claim(CallerClaims.Scope, holder.Scope == TokenScope.Write ? "write" : "read"),
                new Claim(CallerClaims.TokenId, holder.TokenId),
                new Claim(CallerClaims.Expires, holder.ExpiresAt.ToString("O", System.Globalization.CultureInfo.InvariantCulture)),
            ],
            Scheme.Name);
        return AuthenticateResult.Success(new AuthenticationTicket(new ClaimsPrincipal(identity), Scheme.Name));
    }

    /// <inheritdoc/>
    protected override async Task HandleChallengeAsync(AuthenticationProperties properties)
    {
        var result = await HandleAuthenticateOnceSafeAsync();
        Response.Headers.WWWAuthenticate = result.Failure is null ? "Bearer" : "Bearer error=\"invalid_token\"";
        await Problems.WriteAsync(
            Context, StatusCodes.Status401Unauthorized, "notSignedIn",
            result.Failure?.Message ?? "Sign in, or send an API token as Authorization: Bearer TOKEN.");
    }
}
