using System.Diagnostics.CodeAnalysis;
using System.Globalization;

namespace ModelLab.Ledger.Entries;

/// <summary>
/// The kind of an entry as <c>name/version</c>, e.g. <c>data-decision/2</c>: lower-case words (a letter, then letters
/// and digits) joined by single hyphens, a slash, a version from 1 without leading zeros. Never a type's name.
/// </summary>
/// <param name="Name">The name without its version.</param>
/// <param name="Version">From 1.</param>
public sealed record EntryKind(string Name, int Version)
{
    /// <summary>Most characters a name has.</summary>
    public const int MaximumNameLength = 60;

    /// <summary>Reads <c>name/version</c>.</summary>
    /// <exception cref="FormatException">Another form.</exception>
    public static EntryKind Parse(string text) => TryParse(text, out var kind)
        ? kind
        : throw new FormatException($"'{text}' is no kind of entry: lower-case words joined by hyphens, a slash and a version number are expected, as in data-decision/1.");

    /// <summary>Reads <c>name/version</c>; false for another form.</summary>
    public static bool TryParse(string text, [NotNullWhen(true)] out EntryKind? kind)
    {
        kind = null;
        var slash = text.IndexOf('/', StringComparison.Ordinal);
        if (slash < 0 || !IsName(text.AsSpan(0, slash)) || !IsVersion(text.AsSpan(slash + 1), out var version))
        {
            return false;
        }

        kind = new EntryKind(text[..slash], version);
        return true;
    }

    /// <summary>Whether this is a name as a kind may bear it.</summary>
    public static bool IsName(ReadOnlySpan<char> name)
    {
        if (name.Length > MaximumNameLength)
        {
            return false;
        }

        var atWordStart = true;
        foreach (var c in name)
        {
            if (char.IsAsciiLetterLower(c) || (!atWordStart && char.IsAsciiDigit(c)))
            {
                atWordStart = false;
            }
            else if (c == '-' && !atWordStart)
            {
                atWordStart = true;
            }
            else
            {
                return false;
            }
        }

        return !atWordStart;
    }

    /// <summary>The form <c>name/version</c>.</summary>
    public override string ToString() => string.Create(CultureInfo.InvariantCulture, $"{Name}/{Version}");

    private static bool IsVersion(ReadOnlySpan<char> text, out int version) =>
        int.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out version) && version > 0 && text[0] != '0';
}
