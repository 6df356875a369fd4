using ModelLab.Projects;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Features.SignIn;

/// <summary>
/// What a password has to be: long, not built from the person's own name or address, not a handful of characters repeated. No
/// classes of characters are asked for (OWASP ASVS 5.0, chapter 6.2; recalled).
/// </summary>
public sealed class PasswordRules(SignInSettings settings)
{
    /// <summary>Most characters, so that hashing one cannot keep the server busy.</summary>
    public const int MaximumLength = 256;

    private const int FewestDifferentCharacters = 5;
    private const int ShortestWordThatCounts = 4;

    /// <summary>Checks a password.</summary>
    /// <exception cref="RefusedException">It does not do; the message says what would.</exception>
    public void Check(string password, string name, string email)
    {
        if (password.Length < settings.MinimumPasswordLength)
        {
            throw RefusedException.Invalid($"The password has {password.Length} characters; it needs at least {settings.MinimumPasswordLength}. A few unrelated words do well.", "password");
        }

        if (password.Length > MaximumLength)
        {
            throw RefusedException.Invalid($"The password has more than {MaximumLength} characters.", "password");
        }

        if (password.Distinct().Count() < FewestDifferentCharacters || IsRun(password))
        {
            throw RefusedException.Invalid("The password repeats a few characters or counts upwards; choose one that is harder to guess.", "password");
        }

        var own = name.Split(' ').Concat(email.Split('@', '.')).Append("modellab").Where(w => w.Length >= ShortestWordThatCounts);
        var left = own.Aggregate(password, (rest, word) => rest.Replace(word, string.Empty, StringComparison.OrdinalIgnoreCase));
        if (left.Length < settings.MinimumPasswordLength / 2)
        {
            throw RefusedException.Invalid("The password is little more than your name or address; choose one that is harder to guess.", "password");
        }
    }

    /// <summary>Every character follows the one before: abcdefghijkl, 210987654321.</summary>
    private static bool IsRun(string password)
    {
        var steps = password.Zip(password.Skip(1), (a, b) => b - a).ToList();
        return steps.Count(s => s is 1 or -1) >= steps.Count - 2;
    }
}
