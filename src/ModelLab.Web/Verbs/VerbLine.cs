using ModelLab.Projects;
using ModelLab.Store;
using ModelLab.Store.Keys;
using ModelLab.Store.Sqlite;
using ModelLab.Store.Writing;
using ModelLab.Web.Settings;
using ModelLab.Web.Startup;

namespace ModelLab.Web.Verbs;

/// <summary>Runs the program as an administration tool.</summary>
public static class VerbLine
{
    private const int Done = 0;
    private const int Failed = 1;
    private const int WrongUsage = 2;

    /// <summary>All verbs but <c>help</c>.</summary>
    public static IReadOnlyList<IVerb> All { get; } = [new CreateTokenVerb(), new BackupVerb(), new RestoreVerb(), new CheckVerb(), new HealthVerb()];

    /// <summary>
    /// The words of a verb, itself first, or null where a command line asks to serve: it holds settings alone then. Settings may stand
    /// before the verb; they are put behind it.
    /// </summary>
    public static IReadOnlyList<string>? Find(IReadOnlyList<string> words)
    {
        var settings = new List<string>();
        for (var i = 0; i < words.Count; i++)
        {
            if (!words[i].StartsWith('-') || words[i] is "--help" or "-h")
            {
                return [words[i], .. words.Skip(i + 1), .. settings];
            }

            settings.Add(words[i]);
            if (!words[i].Contains('=', StringComparison.Ordinal) && i + 1 < words.Count && !words[i + 1].StartsWith('-'))
            {
                settings.Add(words[++i]);
            }
        }

        return null;
    }

    /// <summary>Runs a verb.</summary>
    /// <returns>The exit code: 0 done, 1 not, 2 for a wrong command line.</returns>
    public static async Task<int> RunAsync(IReadOnlyList<string> words, TextWriter output, TextWriter errors, CancellationToken cancellation)
    {
        if (words[0] is "help" or "--help" or "-h")
        {
            await output.WriteAsync(Help());
            return Done;
        }

        try
        {
            var verb = All.FirstOrDefault(v => v.Name == words[0]) ?? throw new UsageException($"'{words[0]}' is no verb of this program.");
            var arguments = VerbArguments.Parse(verb, [.. words.Skip(1)]);
            await using var app = ServerHost.BuildForVerb([.. arguments.Settings]);
            return await verb.RunAsync(arguments.Options, app.Services, output, cancellation);
        }
        catch (UsageException e)
        {
            await errors.WriteLineAsync($"{e.Message} 'help' lists verbs and options.");
            return WrongUsage;
        }
        catch (Exception e) when (e is RefusedException or SettingsRefusedException or StoreSettingsException or StoreUnusableException or KeysUnusableException or StorageFailedException)
        {
            await errors.WriteLineAsync(e.Message);
            return Failed;
        }
    }

    private static string Help()
    {
        var lines = new List<string>
        {
            "Without a verb the program serves. Its settings come from the environment (ModelLab__DataFolder) or the command line (--ModelLab:DataFolder DIR, --urls ADDRESS).",
            "With a verb it does one thing, with the same settings, also beside a running server:",
            string.Empty,
        };
        foreach (var verb in All)
        {
            var options = verb.Options.Select(o => o.Needed ? $" --{o.Name} {o.Value}" : $" [--{o.Name} {o.Value}]");
            lines.Add($"  {verb.Name}{string.Concat(options)}");
            lines.Add($"      {verb.Summary}");
        }

        lines.Add("  help");
        lines.Add("      Prints this.");
        return string.Join(Environment.NewLine, lines) + Environment.NewLine;
    }
}
