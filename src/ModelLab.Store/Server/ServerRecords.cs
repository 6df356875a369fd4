using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Identity;
using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger.Entries;
using ModelLab.Projects;
using ModelLab.Projects.People;
using ModelLab.Store.Accounts;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Server;

/// <summary>
/// The people of the server: first set-up, enrolment, invitations, disabling. Each change stands in the server ledger,
/// written in the same transaction. Who may do it is asked inside that transaction.
/// </summary>
public sealed class ServerRecords(StoreWriter writer, IDbContextFactory<ModelLabContext> contexts, TimeProvider time)
{
    /// <summary>The actor for what is done at the command line of the machine itself.</summary>
    public const string CommandLineActor = "server";

    /// <summary>How long an invitation holds.</summary>
    public static readonly TimeSpan InvitationLifetime = TimeSpan.FromDays(7);

    private static readonly UpperInvariantLookupNormalizer Normalizer = new();

    /// <summary>All people with an account, by name.</summary>
    public async Task<IReadOnlyList<Person>> PeopleAsync(CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var accounts = await context.Users.AsNoTracking().OrderBy(a => a.Name).ThenBy(a => a.Id).ToListAsync(cancellation);
        return [.. accounts.Select(a => a.ToPerson())];
    }

    /// <summary>Makes the one-time token for first set-up, to be printed on the console; an earlier one no longer holds. Null once there is anybody.</summary>
    public Task<string?> CreateSetUpTokenAsync(CancellationToken cancellation) => writer.WriteAsync<string?>(
        async context =>
        {
            if (await context.Users.AnyAsync())
            {
                return null;
            }

            var secret = Secrets.New("set-up-");
            var hash = Convert.ToHexStringLower(Secrets.Hash(secret));
            var fact = await context.Facts.SingleOrDefaultAsync(f => f.Name == StoreFactRow.SetUpTokenHash);
            if (fact is null)
            {
                context.Facts.Add(new StoreFactRow { Name = StoreFactRow.SetUpTokenHash, Value = hash });
            }
            else
            {
                fact.Value = hash;
            }

            return secret;
        },
        cancellation);

    /// <summary>First set-up: makes the first account, an administrator, and uses the token up.</summary>
    /// <param name="setUpToken">As printed on the console.</param>
    /// <param name="name">Printed name.</param>
    /// <param name="email">Address for sign-in.</param>
    /// <param name="passwordHash">From the password hasher of the sign-in, after its rules for passwords.</param>
    /// <param name="cancellation">Withdraws the request.</param>
    /// <exception cref="RefusedException">The token is wrong or used, or somebody has an account already.</exception>
    public Task<Person> SetUpAsync(string setUpToken, string name, string email, string passwordHash, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var hash = Convert.ToHexStringLower(Secrets.Hash(setUpToken));
            var fact = await context.Facts.SingleOrDefaultAsync(f => f.Name == StoreFactRow.SetUpTokenHash && f.Value == hash);
            if (fact is null || await context.Users.AnyAsync())
            {
                throw new RefusedException(
                    RefusalKind.Forbidden, "The set-up token does not hold. It stands on the console of the server since its last start and works once.");
            }

            context.Facts.Remove(fact);
            var account = await NewAccountAsync(context, name, email, administrator: true);
            account.PasswordHash = passwordHash;
            account.EmailConfirmed = true;
            var by = new Author(account.Id, account.Name);
            await ServerLedger.RecordAsync(context, "first-set-up/1", account.EnrolledAt, by, null, new JsonObject { ["personId"] = account.Id });
            await RecordEnrolmentAsync(context, account, by);
            return account.ToPerson();
        },
        cancellation);

    /// <summary>Makes an account that cannot sign in until its person has used the invitation.</summary>
    /// <param name="actorId">An administrator, or <see cref="CommandLineActor"/>.</param>
    /// <param name="name">Printed name.</param>
    /// <param name="email">Address for sign-in.</param>
    /// <param name="administrator">Whether the person may manage people.</param>
    /// <param name="cancellation">Withdraws the request.</param>
    /// <exception cref="RefusedException">Not allowed, a field is wrong, or the address has an account already.</exception>
    public Task<Invitation> EnrolAsync(string actorId, string name, string email, bool administrator, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var by = await ServerActors.AdministratorAsync(context, actorId);
            var account = await NewAccountAsync(context, name, email, administrator);
            await RecordEnrolmentAsync(context, account, by);
            return await InviteAsync(context, account);
        },
        cancellation);

    /// <summary>Gives a person a new invitation, e.g. after a forgotten password; an earlier one no longer holds.</summary>
    /// <exception cref="RefusedException">Not allowed, or there is no such active person.</exception>
    public Task<Invitation> InviteAgainAsync(string actorId, string personId, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var by = await ServerActors.AdministratorAsync(context, actorId);
            var account = await AccountAsync(context, personId);
            if (!account.Active)
            {
                throw new RefusedException(RefusalKind.Conflict, $"{account.Name} is disabled; enable the account first.");
            }

            await ServerLedger.RecordAsync(context, "person-invited-again/1", time.GetUtcNow(), by, null, new JsonObject { ["personId"] = personId });
            return await InviteAsync(context, account);
        },
        cancellation);

    /// <summary>Whom an invitation is for; null when it does not hold (any more).</summary>
    public async Task<Person?> FindInvitedAsync(string secret, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var invitation = await HoldingInvitationAsync(context, secret);
        return invitation is null ? null : (await AccountAsync(context, invitation.PersonId)).ToPerson();
    }

    /// <summary>Sets the password of an invited person, ends sessions, revokes API tokens and uses the invitation up: whoever needs a new password may have lost more than it.</summary>
    /// <param name="secret">The invitation.</param>
    /// <param name="passwordHash">From the password hasher of the sign-in, after its rules for passwords.</param>
    /// <param name="cancellation">Withdraws the request.</param>
    /// <exception cref="RefusedException">The invitation does not hold.</exception>
    public Task<Person> AcceptInvitationAsync(string secret, string passwordHash, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var invitation = await HoldingInvitationAsync(context, secret)
                ?? throw new RefusedException(RefusalKind.Forbidden, "This invitation was used, replaced or has expired; ask an administrator for a new one.");
            var account = await AccountAsync(context, invitation.PersonId);
            account.PasswordHash = passwordHash;
            account.EmailConfirmed = true;
            account.AccessFailedCount = 0;
            account.LockoutEnd = null;
            account.SecurityStamp = NewId();
            account.ConcurrencyStamp = NewId();
            context.Invitations.Remove(invitation);
            var (by, now) = (new Author(account.Id, account.Name), time.GetUtcNow());
            await ServerLedger.RecordAsync(context, "invitation-taken-up/1", now, by, null, new JsonObject { ["personId"] = account.Id });
            await ApiTokens.RevokeAllAsync(context, account.Id, by, now);
            return account.ToPerson();
        },
        cancellation);

    /// <summary>Ends all sessions of a person, as signing out does; API tokens stay. A person without an account has none to end.</summary>
    public Task EndSessionsAsync(string personId, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            if (await context.Users.SingleOrDefaultAsync(a => a.Id == personId) is { } account)
            {
                account.SecurityStamp = NewId();
                account.ConcurrencyStamp = NewId();
            }

            return personId;
        },
        cancellation);

    /// <summary>Disables a person: sessions, tokens and invitations hold no longer. Nothing that the person did disappears.</summary>
    /// <exception cref="RefusedException">Not allowed, no such person, or the last active administrator.</exception>
    public Task<Person> DisableAsync(string actorId, string personId, string reason, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var by = await ServerActors.AdministratorAsync(context, actorId);
            var account = await AccountAsync(context, personId);
            if (account.Administrator && !await context.Users.AnyAsync(a => a.Administrator && a.Active && a.Id != personId))
            {
                throw new RefusedException(RefusalKind.Conflict, $"{account.Name} is the last active administrator; make another one first.");
            }

            if (account.Active)
            {
                account.Active = false;
                account.SecurityStamp = NewId();
                account.ConcurrencyStamp = NewId();
                context.Invitations.RemoveRange(await context.Invitations.Where(i => i.PersonId == personId).ToListAsync());
                await ServerLedger.RecordAsync(context, "person-disabled/1", time.GetUtcNow(), by, Reasons.Require(reason), new JsonObject { ["personId"] = personId });
            }

            return account.ToPerson();
        },
        cancellation);

    /// <summary>Enables a disabled person again.</summary>
    /// <exception cref="RefusedException">Not allowed, or no such person.</exception>
    public Task<Person> EnableAsync(string actorId, string personId, string reason, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var by = await ServerActors.AdministratorAsync(context, actorId);
            var account = await AccountAsync(context, personId);
            if (!account.Active)
            {
                account.Active = true;
                account.ConcurrencyStamp = NewId();
                await ServerLedger.RecordAsync(context, "person-enabled/1", time.GetUtcNow(), by, Reasons.Require(reason), new JsonObject { ["personId"] = personId });
            }

            return account.ToPerson();
        },
        cancellation);

    private static string NewId() => Guid.NewGuid().ToString("N");

    private static async Task<Account> AccountAsync(ModelLabContext context, string personId) =>
        await context.Users.SingleOrDefaultAsync(a => a.Id == personId)
        ?? throw new RefusedException(RefusalKind.NotFound, "There is no such person on this server.");

    private async Task<InvitationRow?> HoldingInvitationAsync(ModelLabContext context, string secret)
    {
        var hash = Secrets.Hash(secret);
        var now = time.GetUtcNow();
        return await context.Invitations.SingleOrDefaultAsync(
            i => i.SecretHash == hash && i.ExpiresAt > now && context.Users.Any(a => a.Id == i.PersonId && a.Active));
    }

    private async Task<Account> NewAccountAsync(ModelLabContext context, string name, string email, bool administrator)
    {
        name = Reasons.Name(name, "name");
        email = email.Trim();
        if (email.Length is 0 or > 254 || email.Count(c => c == '@') != 1 || email[0] == '@' || email[^1] == '@' || email.Any(c => char.IsWhiteSpace(c) || char.IsControl(c) || Reasons.IsInvisible(c)))
        {
            throw RefusedException.Invalid("An e-mail address has the form name@place, without blanks.", "email");
        }

        var normalized = Normalizer.NormalizeEmail(email);
        if (await context.Users.AnyAsync(a => a.NormalizedEmail == normalized))
        {
            throw new RefusedException(RefusalKind.Conflict, $"{email} has an account on this server already.");
        }

        var account = new Account
        {
            Id = NewId(),
            Name = name,
            UserName = email,
            NormalizedUserName = Normalizer.NormalizeName(email),
            Email = email,
            NormalizedEmail = normalized,
            SecurityStamp = NewId(),
            ConcurrencyStamp = NewId(),
            LockoutEnabled = true,
            Administrator = administrator,
            EnrolledAt = time.GetUtcNow(),
        };
        context.Users.Add(account);
        return account;
    }

    private static Task RecordEnrolmentAsync(ModelLabContext context, Account account, Author by) => ServerLedger.RecordAsync(
        context, "person-enrolled/1", account.EnrolledAt, by, null,
        new JsonObject { ["personId"] = account.Id, ["name"] = account.Name, ["email"] = account.Email, ["administrator"] = account.Administrator });

    private async Task<Invitation> InviteAsync(ModelLabContext context, Account account)
    {
        var secret = Secrets.New("invite-");
        var expires = time.GetUtcNow() + InvitationLifetime;
        var row = await context.Invitations.SingleOrDefaultAsync(i => i.PersonId == account.Id);
        if (row is null)
        {
            context.Invitations.Add(new InvitationRow { PersonId = account.Id, SecretHash = Secrets.Hash(secret), ExpiresAt = expires });
        }
        else
        {
            row.SecretHash = Secrets.Hash(secret);
            row.ExpiresAt = expires;
        }

        return new Invitation(account.ToPerson(), secret, expires);
    }
}
