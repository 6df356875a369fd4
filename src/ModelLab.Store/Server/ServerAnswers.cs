using ModelLab.Projects.People;

namespace ModelLab.Store.Server;

/// <summary>An invitation to set a password: its secret is told once, for a link to hand over.</summary>
/// <param name="Person">Who is invited.</param>
/// <param name="Secret">The secret.</param>
/// <param name="ExpiresAt">From when on it is refused.</param>
public sealed record Invitation(Person Person, string Secret, DateTimeOffset ExpiresAt);

/// <summary>A newly issued API token: its secret is told once.</summary>
/// <param name="Token">The token.</param>
/// <param name="Secret">What the caller sends as <c>Authorization: Bearer</c>; begins with <c>ml_</c>.</param>
public sealed record IssuedToken(ApiToken Token, string Secret);

/// <summary>An API token, without its secret.</summary>
/// <param name="Id">Id; not secret.</param>
/// <param name="PersonId">Whose.</param>
/// <param name="Name">What it is for.</param>
/// <param name="Scope">What it may do.</param>
/// <param name="IssuedAt">When it was issued.</param>
/// <param name="ExpiresAt">From when on it is refused.</param>
/// <param name="RevokedAt">When it was revoked, or null.</param>
/// <param name="LastUsedAt">When it was last used, to the minute, or null.</param>
public sealed record ApiToken(
    string Id, string PersonId, string Name, TokenScope Scope, DateTimeOffset IssuedAt, DateTimeOffset ExpiresAt,
    DateTimeOffset? RevokedAt, DateTimeOffset? LastUsedAt);

/// <summary>Whom a token speaks for.</summary>
/// <param name="Person">An active person.</param>
/// <param name="TokenId">Id of the token.</param>
/// <param name="Scope">What it may do.</param>
/// <param name="ExpiresAt">From when on it is refused.</param>
public sealed record TokenHolder(Person Person, string TokenId, TokenScope Scope, DateTimeOffset ExpiresAt);
