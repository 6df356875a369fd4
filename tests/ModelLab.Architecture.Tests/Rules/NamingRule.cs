using System.Text.RegularExpressions;
using Mono.Cecil;

namespace ModelLab.Architecture.Tests.Rules;

/// <summary>A type or namespace says what it is about; names that would fit anything say nothing.</summary>
public static partial class NamingRule
{
    private static readonly HashSet<string> Empty = new(StringComparer.OrdinalIgnoreCase)
    {
        "Util", "Utils", "Utility", "Utilities", "Helper", "Helpers", "Manager", "Managers", "Common", "Misc",
    };

    /// <summary>Types whose name, or whose namespace, holds such a word.</summary>
    public static IEnumerable<string> Violations(IEnumerable<TypeDefinition> types) => types
        .Where(t => !t.Name.Contains('<', StringComparison.Ordinal))
        .SelectMany(t => Words().Matches(t.FullName).Select(m => m.Value).Where(Empty.Contains).Select(word => $"{t.FullName} is named {word}"));

    // The words of a name in capitals and small letters: "HTTPRetryHelper" is HTTP, Retry, Helper.
    [GeneratedRegex("[A-Z]+(?![a-z])|[A-Z]?[a-z]+")]
    private static partial Regex Words();
}
