using ModelLab.Store.Sqlite.Upkeep;

namespace ModelLab.Web.Verbs;

/// <summary>Writes a backup, also while the server writes, and prints its id.</summary>
public sealed class BackupVerb : IVerb
{
    /// <inheritdoc/>
    public string Name => "backup";

    /// <inheritdoc/>
    public string Summary => "Copies the data into one new folder and the keys into another, and prints the backup's id. Keep the two apart.";

    /// <inheritdoc/>
    public IReadOnlyList<VerbOption> Options { get; } = [new("data", "DIR"), new("keys", "DIR")];

    /// <inheritdoc/>
    public async Task<int> RunAsync(IReadOnlyDictionary<string, string> options, IServiceProvider services, TextWriter output, CancellationToken cancellation)
    {
        var result = services.GetRequiredService<StoreBackup>().Run(options["data"], options["keys"]);
        await output.WriteLineAsync(result.BackupId);
        return 0;
    }
}
