using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger.Entries;
using ModelLab.Projects;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Server;

/// <summary>API tokens: named, scoped, expiring, revocable; issue and revocation stand in the server ledger.</summary>
public sealed class ApiTokens(StoreWriter writer, IDbContextFactory<ModelLabContext> contexts, TimeProvider time)
{
    /// <summary>The longest time for which a token may hold.</summary>
    public static readonly TimeSpan LongestLifetime = TimeSpan.FromDays(366);

    private static readonly TimeSpan UseResolution = TimeSpan.FromMinutes(1);

    /// <summary>Issues a token for an active person.</summary>
    /// <param name="actorId">The person, an administrator, or <see cref="ServerRecords.CommandLineActor"/>.</param>
    /// <param name="personId">For whom.</param>
    /// <param name="name">What it is for; 1 to 200 characters.</param>
    /// <param name="scope">What it may do.</param>
    /// <param name="lifetime">For how long; at most <see cref="LongestLifetime"/>.</param>
    /// <param name="cancellation">Withdraws the request.</param>
    /// <exception cref="RefusedException">Not allowed, a field is wrong, or the person does not exist or is disabled.</exception>
    public Task<IssuedToken> IssueAsync(
        string actorId, string personId, string name, TokenScope scope, TimeSpan lifetime, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var by = await ServerActors.PersonOrAdministratorAsync(context, actorId, personId);
            var person = await context.Users.AsNoTracking().SingleOrDefaultAsync(a => a.Id == personId)
                ?? throw new RefusedException(RefusalKind.NotFound, "There is no such person on this server.");
            if (!person.Active)
            {
                throw new RefusedException(RefusalKind.Conflict, $"{person.Name} is disabled; a token would hold for nobody.");
            }

            name = Reasons.Name(name, "name");

            if (lifetime <= TimeSpan.Zero || lifetime > LongestLifetime)
            {
                throw RefusedException.Invalid($"A token holds for 1 to {LongestLifetime.Days} days.", "days");
            }

            var secret = Secrets.New("ml_");
            var now = time.GetUtcNow();
            var row = new ApiTokenRow
            {
                Id = Guid.NewGuid().ToString("N"),
                PersonId = personId,
                Name = name,
                Scope = scope,
                SecretHash = Secrets.Hash(secret),
                IssuedAt = now,
                ExpiresAt = now + lifetime,
            };
            context.ApiTokens.Add(row);
            await ServerLedger.RecordAsync(context, "token-issued/1", now, by, null, new JsonObject
            {
                ["tokenId"] = row.Id,
                ["personId"] = personId,
                ["name"] = name,
                ["scope"] = scope == TokenScope.Write ? "write" : "read",
                ["expiresAt"] = row.ExpiresAt.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", System.Globalization.CultureInfo.InvariantCulture),
            });
            return new IssuedToken(ToToken(row), secret);
        },
        cancellation);

    /// <summary>Revokes a token at once. A token already revoked stays as it is.</summary>
    /// <exception cref="RefusedException">Not allowed, or there is no such token.</exception>
    public Task<ApiToken> RevokeAsync(string actorId, string tokenId, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var row = await context.ApiTokens.SingleOrDefaultAsync(t => t.Id == tokenId) ?? throw RefusedException.NotFound("token");
            var by = await ServerActors.PersonOrAdministratorAsync(context, actorId, row.PersonId);
            if (row.RevokedAt is null)
            {
                await RevokeAsync(context, row, by, time.GetUtcNow());
            }

            return ToToken(row);
        },
        cancellation);

    /// <summary>A person's tokens, newest first, revoked and expired ones too.</summary>
    public async Task<IReadOnlyList<ApiToken>> OfPersonAsync(string personId, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var rows = await context.ApiTokens.AsNoTracking().Where(t => t.PersonId == personId).OrderByDescending(t => t.IssuedAt).ThenBy(t => t.Id).ToListAsync(cancellation);
        return [.. rows.Select(ToToken)];
    }

    /// <summary>Whom a secret speaks for, asked anew at each call; null for one that is unknown, revoked, expired, or of a disabled person.</summary>
    public async Task<TokenHolder?> FindHolderAsync(string secret, CancellationToken cancellation)
    {
        var hash = Secrets.Hash(secret);
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var row = await context.ApiTokens.AsNoTracking().SingleOrDefaultAsync(t => t.SecretHash == hash, cancellation);
        var now = time.GetUtcNow();
        if (row is null || row.RevokedAt is not null || row.ExpiresAt <= now)
        {
            return null;
        }

        var account = await context.Users.AsNoTracking().SingleOrDefaultAsync(a => a.Id == row.PersonId && a.Active, cancellation);
        if (account is null)
        {
            return null;
        }

        if (row.LastUsedAt is null || now - row.LastUsedAt >= UseResolution)
        {
            await NoteUseAsync(row.Id, now, cancellation);
        }

        return new TokenHolder(account.ToPerson(), row.Id, row.Scope, row.ExpiresAt);
    }

    /// <summary>Revokes the tokens of a person that hold still, within the transaction of what asks for it.</summary>
    internal static async Task RevokeAllAsync(ModelLabContext context, string personId, Author by, DateTimeOffset at)
    {
        var rows = await context.ApiTokens.Where(t => t.PersonId == personId && t.RevokedAt == null && t.ExpiresAt > at).OrderBy(t => t.IssuedAt).ThenBy(t => t.Id).ToListAsync();
        foreach (var row in rows)
        {
            await RevokeAsync(context, row, by, at);
        }
    }

    private static Task RevokeAsync(ModelLabContext context, ApiTokenRow row, Author by, DateTimeOffset at)
    {
        row.RevokedAt = at;
        return ServerLedger.RecordAsync(context, "token-revoked/1", at, by, null, new JsonObject { ["tokenId"] = row.Id, ["personId"] = row.PersonId });
    }

    /// <summary>A full disk does not keep anybody from reading: when a token was last used is then not noted.</summary>
    private async Task NoteUseAsync(string tokenId, DateTimeOffset at, CancellationToken cancellation)
    {
        try
        {
            await writer.WriteAsync(c => c.ApiTokens.Where(t => t.Id == tokenId).ExecuteUpdateAsync(s => s.SetProperty(t => t.LastUsedAt, at)), cancellation);
        }
        catch (StorageFailedException)
        {
            // The next use tries again.
        }
    }

    private static ApiToken ToToken(ApiTokenRow row) =>
        new(row.Id, row.PersonId, row.Name, row.Scope, row.IssuedAt, row.ExpiresAt, row.RevokedAt, row.LastUsedAt);
}
