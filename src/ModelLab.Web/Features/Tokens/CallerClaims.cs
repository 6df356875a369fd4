using System.Globalization;
using System.Security.Claims;
using ModelLab.Projects.People;

namespace ModelLab.Web.Features.Tokens;

/// <summary>Who calls, read from what authentication established.</summary>
public static class CallerClaims
{
    /// <summary>Claim: scope of the token, <c>read</c> or <c>write</c>. A session has none and may write.</summary>
    public const string Scope = "scope";

    /// <summary>Claim: id of the token.</summary>
    public const string TokenId = "token-id";

    /// <summary>Claim: when the token expires.</summary>
    public const string Expires = "token-expires";

    /// <summary>The caller for a use case.</summary>
    public static Caller ToCaller(this ClaimsPrincipal user) => new(user.PersonId(), user.FindFirstValue(Scope) is null or "write");

    /// <summary>Id of the person who calls.</summary>
    public static string PersonId(this ClaimsPrincipal user) =>
        user.FindFirstValue(ClaimTypes.NameIdentifier) ?? throw new InvalidOperationException("An endpoint that asks who calls has to require authorization.");

    /// <summary>When the caller's token expires; null for a session.</summary>
    public static DateTimeOffset? TokenExpiry(this ClaimsPrincipal user) =>
        user.FindFirstValue(Expires) is { } text ? DateTimeOffset.Parse(text, CultureInfo.InvariantCulture) : null;
}
