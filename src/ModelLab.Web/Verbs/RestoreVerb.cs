using ModelLab.Store.Sqlite.Upkeep;

namespace ModelLab.Web.Verbs;

/// <summary>Puts a backup into the empty folders that the settings name.</summary>
public sealed class RestoreVerb : IVerb
{
    /// <inheritdoc/>
    public string Name => "restore";

    /// <inheritdoc/>
    public string Summary => "Puts a backup into the empty folders of the settings and prints its id. A later database of keys withdraws again what was withdrawn after the backup.";

    /// <inheritdoc/>
    public IReadOnlyList<VerbOption> Options { get; } = [new("data", "DIR"), new("keys", "DIR"), new("later-keys", "FILE", Needed: false)];

    /// <inheritdoc/>
    public async Task<int> RunAsync(IReadOnlyDictionary<string, string> options, IServiceProvider services, TextWriter output, CancellationToken cancellation)
    {
        var result = services.GetRequiredService<StoreRestore>().Run(options["data"], options["keys"], options.GetValueOrDefault("later-keys"));
        await output.WriteLineAsync(result.BackupId);
        return 0;
    }
}
