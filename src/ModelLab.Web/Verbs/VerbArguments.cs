namespace ModelLab.Web.Verbs;

/// <summary>A command line taken apart.</summary>
/// <param name="Options">Options of the verb.</param>
/// <param name="Settings">Arguments that are settings, as the server takes them: <c>--urls</c>, <c>--environment</c>, <c>--ModelLab:...</c>.</param>
public sealed record VerbArguments(IReadOnlyDictionary<string, string> Options, IReadOnlyList<string> Settings)
{
    private static readonly string[] OrdinarySettings = ["urls", "environment", "contentRoot"];

    /// <summary>Takes the words after the verb apart.</summary>
    /// <exception cref="UsageException">An option is not known, stands twice, has no value, or is missing.</exception>
    public static VerbArguments Parse(IVerb verb, IReadOnlyList<string> words)
    {
        var options = new Dictionary<string, string>(StringComparer.Ordinal);
        var settings = new List<string>();
        for (var i = 0; i < words.Count; i++)
        {
            if (!words[i].StartsWith("--", StringComparison.Ordinal))
            {
                throw new UsageException($"'{words[i]}' is not expected after '{verb.Name}'.");
            }

            var parts = words[i][2..].Split('=', 2);
            var known = verb.Options.Any(o => o.Name == parts[0]);
            if (!known && !IsSetting(parts[0]))
            {
                throw new UsageException($"'{verb.Name}' has no option --{parts[0]}.");
            }

            var value = parts.Length == 2 ? parts[1]
                : i + 1 < words.Count && !words[i + 1].StartsWith("--", StringComparison.Ordinal) ? words[++i]
                : throw new UsageException($"The option --{parts[0]} needs a value.");
            if (!known)
            {
                settings.Add($"--{parts[0]}={value}");
            }
            else if (!options.TryAdd(parts[0], value))
            {
                throw new UsageException($"The option --{parts[0]} stands twice.");
            }
        }

        return verb.Options.FirstOrDefault(o => o.Needed && !options.ContainsKey(o.Name)) is { } missing
            ? throw new UsageException($"'{verb.Name}' needs the option --{missing.Name} {missing.Value}.")
            : new VerbArguments(options, settings);
    }

    private static bool IsSetting(string name) => name.Contains(':', StringComparison.Ordinal) || OrdinarySettings.Contains(name, StringComparer.OrdinalIgnoreCase);
}
