using Microsoft.AspNetCore.Identity;
using ModelLab.Projects;
using ModelLab.Store.Accounts;
using ModelLab.Store.Writing;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Features.SignIn;

/// <summary>How an attempt to sign in went.</summary>
public enum SignInOutcome
{
    /// <summary>Signed in.</summary>
    SignedIn,

    /// <summary>No such account, or not its password; which of them is not told.</summary>
    Wrong,

    /// <summary>Too many failures for the account or from the address; the right password does not help before the time is over.</summary>
    LockedOut,

    /// <summary>The password is right, but the account is disabled.</summary>
    Disabled,
}

/// <summary>The result of an attempt.</summary>
/// <param name="Outcome">How it went.</param>
/// <param name="Account">The account where signed in, else null.</param>
/// <param name="Until">Until when locked out, else null.</param>
public sealed record SignInResult(SignInOutcome Outcome, Account? Account = null, DateTimeOffset? Until = null);

/// <summary>
/// Checks a password. Failures are counted for the account (in the database), for e-mail addresses without an account (alike, so
/// that a lock-out tells nobody who has one) and for the address the attempts come from. Unknown accounts cost the same time.
/// </summary>
public sealed partial class SignInDesk(SignInAttempts attempts, UserManager<Account> accounts, IPasswordHasher<Account> hasher, TimeProvider clock, ILogger<SignInDesk> log)
{
    private const int LongestEmail = 320;

    /// <summary>Tries a password.</summary>
    /// <exception cref="RefusedException">The account was changed at the same moment.</exception>
    public async Task<SignInResult> TryAsync(string email, string password, string address, CancellationToken cancellation)
    {
        if (attempts.Addresses.LockedUntil(address) is { } until)
        {
            return new SignInResult(SignInOutcome.LockedOut, Until: until);
        }

        // No account has such an address or password; it is neither looked up nor remembered.
        if (password.Length > PasswordRules.MaximumLength || email.Length > LongestEmail)
        {
            attempts.Addresses.Failed(address);
            return new SignInResult(SignInOutcome.Wrong);
        }

        // One attempt at a time for one account: attempts side by side would be counted as one.
        var key = accounts.NormalizeEmail(email.Trim());
        using var turn = await attempts.TakeTurnAsync(key, cancellation);
        var account = await accounts.FindByEmailAsync(email.Trim());
        try
        {
            var result = account is null ? TryUnknown(key, password) : await TryAccountAsync(account, password);
            if (result.Outcome is SignInOutcome.Wrong)
            {
                attempts.Addresses.Failed(address);
            }

            return result;
        }
        catch (StorageFailedException)
        {
            // A full disk takes no count for the account: the address is counted all the same, so that nobody may try for ever.
            attempts.Addresses.Failed(address);
            throw;
        }
    }

    private SignInResult TryUnknown(string key, string password)
    {
        if (attempts.UnknownAccounts.LockedUntil(key) is { } until)
        {
            return new SignInResult(SignInOutcome.LockedOut, Until: until);
        }

        hasher.VerifyHashedPassword(null!, attempts.HashOfNobody(hasher), password);
        attempts.UnknownAccounts.Failed(key);
        return new SignInResult(SignInOutcome.Wrong);
    }

    private async Task<SignInResult> TryAccountAsync(Account account, string password)
    {
        if (account.LockoutEnd is { } until && until > clock.GetUtcNow())
        {
            return new SignInResult(SignInOutcome.LockedOut, Until: until);
        }

        var verified = account.PasswordHash is null
            ? hasher.VerifyHashedPassword(account, attempts.HashOfNobody(hasher), password)
            : hasher.VerifyHashedPassword(account, account.PasswordHash, password);
        if (verified == PasswordVerificationResult.Failed || account.PasswordHash is null)
        {
            account.AccessFailedCount++;
            if (account.AccessFailedCount >= attempts.FailuresPerAccount)
            {
                account.AccessFailedCount = 0;
                account.LockoutEnd = clock.GetUtcNow() + attempts.LockOut;
                LogLockOut(account.Id, account.LockoutEnd.Value);
            }

            await SaveAsync(account);
            return new SignInResult(SignInOutcome.Wrong);
        }

        if (!account.Active)
        {
            return new SignInResult(SignInOutcome.Disabled);
        }

        if (account.AccessFailedCount > 0 || account.LockoutEnd is not null || verified == PasswordVerificationResult.SuccessRehashNeeded)
        {
            account.AccessFailedCount = 0;
            account.LockoutEnd = null;
            if (verified == PasswordVerificationResult.SuccessRehashNeeded)
            {
                account.PasswordHash = hasher.HashPassword(account, password);
            }

            await SaveAsync(account);
        }

        return new SignInResult(SignInOutcome.SignedIn, account);
    }

    private async Task SaveAsync(Account account)
    {
        var saved = await accounts.UpdateAsync(account);
        if (saved.Errors.Any(e => e.Code == nameof(IdentityErrorDescriber.ConcurrencyFailure)))
        {
            throw new RefusedException(RefusalKind.Conflict, "The account was changed at the same moment. Try again.");
        }

        if (!saved.Succeeded)
        {
            throw new InvalidOperationException($"The account could not be saved: {string.Join("; ", saved.Errors.Select(e => e.Code))}.");
        }
    }

    [LoggerMessage(LogLevel.Warning, "The account {PersonId} is locked out until {Until} after too many failed attempts to sign in")]
    private partial void LogLockOut(string personId, DateTimeOffset until);
}

/// <summary>What is remembered between attempts to sign in.</summary>
public sealed class SignInAttempts
{
    private readonly SemaphoreSlim[] turns = [.. Enumerable.Range(0, 64).Select(_ => new SemaphoreSlim(1))];
    private string? hashOfNobody;

    /// <summary>Begins with nothing remembered.</summary>
    public SignInAttempts(SignInSettings settings, TimeProvider clock)
    {
        FailuresPerAccount = settings.FailuresPerAccount;
        LockOut = TimeSpan.FromMinutes(settings.LockOutMinutes);
        Addresses = new FailureCounter(settings.FailuresPerAddress, LockOut, clock);
        UnknownAccounts = new FailureCounter(settings.FailuresPerAccount, LockOut, clock);
    }

    /// <summary>Failures after which an account is locked out.</summary>
    public int FailuresPerAccount { get; }

    /// <summary>How long a lock-out lasts.</summary>
    public TimeSpan LockOut { get; }

    /// <summary>Failures by the address they come from.</summary>
    public FailureCounter Addresses { get; }

    /// <summary>Failures for e-mail addresses that have no account.</summary>
    public FailureCounter UnknownAccounts { get; }

    /// <summary>A hash that no password fits, made once at the cost of a real one.</summary>
    public string HashOfNobody(IPasswordHasher<Account> hasher) =>
        hashOfNobody ??= hasher.HashPassword(null!, Convert.ToHexString(System.Security.Cryptography.RandomNumberGenerator.GetBytes(32)));

    /// <summary>Waits until no other attempt for the account is under way.</summary>
    public async Task<IDisposable> TakeTurnAsync(string key, CancellationToken cancellation)
    {
        var turn = turns[(uint)key.GetHashCode(StringComparison.Ordinal) % turns.Length];
        await turn.WaitAsync(cancellation);
        return new Turn(turn);
    }

    private sealed class Turn(SemaphoreSlim semaphore) : IDisposable
    {
        public void Dispose() => semaphore.Release();
    }
}
