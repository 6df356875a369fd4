using System.ComponentModel.DataAnnotations;

namespace ModelLab.Web.Settings;

/// <summary>Passwords, sessions and lock-out: <c>ModelLab:SignIn</c>.</summary>
public sealed class SignInSettings : ISettings
{
    /// <summary>Fewest characters of a password. There are no rules of composition beside it (OWASP ASVS 5.0, 6.2).</summary>
    [Range(12, 64)]
    public int MinimumPasswordLength { get; set; } = 12;

    /// <summary>Failures after which an account is locked out.</summary>
    [Range(3, 100)]
    public int FailuresPerAccount { get; set; } = 5;

    /// <summary>Failures after which an address is locked out, whatever the accounts.</summary>
    [Range(3, 10_000)]
    public int FailuresPerAddress { get; set; } = 20;

    /// <summary>How long a lock-out lasts, and how far back failures are counted, in minutes.</summary>
    [Range(1, 24 * 60)]
    public int LockOutMinutes { get; set; } = 15;

    /// <summary>Attempts to sign in, set up or take up an invitation that one address has in a minute, successful or not.</summary>
    [Range(1, 10_000)]
    public int AttemptsPerMinute { get; set; } = 30;

    /// <summary>How long a session lasts without use, in hours.</summary>
    [Range(1, 24 * 30)]
    public int SessionHours { get; set; } = 12;

    /// <summary>How long a session lasts at most, used or not, in hours; not less than <see cref="SessionHours"/>.</summary>
    [Range(1, 24 * 90)]
    public int LongestSessionHours { get; set; } = 72;

    /// <inheritdoc/>
    public IEnumerable<SettingProblem> Check()
    {
        if (LongestSessionHours < SessionHours)
        {
            yield return new SettingProblem(nameof(LongestSessionHours), $"is {LongestSessionHours}, less than SessionHours ({SessionHours}).");
        }
    }
}
