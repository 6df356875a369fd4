using System.Globalization;

namespace ModelLab.Projects;

/// <summary>Checks of what people type, in one place.</summary>
public static class Reasons
{
    /// <summary>Longest reason, comment or question, in characters.</summary>
    public const int LongestText = 10_000;

    /// <summary>Longest name, in characters.</summary>
    public const int LongestName = 200;

    /// <summary>A reason: trimmed, not empty.</summary>
    public static string Require(string? reason) => Text(reason, "reason", "Say why: a decision is recorded with its reason.", LongestText);

    /// <summary>A one-line name: trimmed, not empty.</summary>
    public static string Name(string? name, string field)
    {
        var text = Text(name, field, $"Give a {field}.", LongestName);
        return text.Any(char.IsControl) ? throw RefusedException.Invalid($"The {field} is one line of text.", field)
            : text.Any(TurnsText) ? throw RefusedException.Invalid($"The {field} holds a character that turns the direction of the text around it; leave it out.", field)
            : text;
    }

    /// <summary>A text of several lines: trimmed, not empty, no control characters but line ends and tabs.</summary>
    public static string Text(string? text, string field, string whenEmpty, int longest = LongestText)
    {
        var trimmed = text?.Trim();
        if (trimmed is null || trimmed.All(c => char.IsWhiteSpace(c) || IsInvisible(c)))
        {
            throw RefusedException.Invalid(whenEmpty + " Nothing was stored.", field);
        }

        if (trimmed.Length > longest)
        {
            throw RefusedException.Invalid($"The {field} has {trimmed.Length} characters; at most {longest} are kept.", field);
        }

        for (var i = 0; i < trimmed.Length; i++)
        {
            var c = trimmed[i];
            if ((char.IsControl(c) && c is not ('\n' or '\r' or '\t')) || IsLoneSurrogate(trimmed, i))
            {
                throw RefusedException.Invalid($"The {field} holds a character that is no text (position {i + 1}).", field);
            }
        }

        return trimmed;
    }

    /// <summary>Whether a character shows nothing: formatting marks such as the zero-width space, and code points that are no characters.</summary>
    public static bool IsInvisible(char c) => char.GetUnicodeCategory(c) is UnicodeCategory.Format or UnicodeCategory.OtherNotAssigned;

    /// <summary>Embeddings, overrides and isolates of the bidirectional algorithm (UAX #9): in a name they make one person look like another.</summary>
    private static bool TurnsText(char c) => c is (>= '\u202A' and <= '\u202E') or (>= '\u2066' and <= '\u2069');

    private static bool IsLoneSurrogate(string text, int i) =>
        char.IsHighSurrogate(text[i]) ? i + 1 >= text.Length || !char.IsLowSurrogate(text[i + 1])
        : char.IsLowSurrogate(text[i]) && (i == 0 || !char.IsHighSurrogate(text[i - 1]));
}
