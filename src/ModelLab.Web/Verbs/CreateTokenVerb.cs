using System.Globalization;
using ModelLab.Projects;
using ModelLab.Projects.People;
using ModelLab.Store.Server;
using ModelLab.Store.Sqlite.Starting;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Verbs;

/// <summary>Issues an API token for a person and prints the token alone.</summary>
public sealed class CreateTokenVerb : IVerb
{
    /// <inheritdoc/>
    public string Name => "create-token";

    /// <inheritdoc/>
    public string Summary => "Issues an API token for a person and prints the token alone.";

    /// <inheritdoc/>
    public IReadOnlyList<VerbOption> Options { get; } =
    [
        new("person", "EMAIL"), new("scope", "read|write"), new("days", "N", Needed: false), new("name", "TEXT", Needed: false),
    ];

    /// <inheritdoc/>
    public async Task<int> RunAsync(IReadOnlyDictionary<string, string> options, IServiceProvider services, TextWriter output, CancellationToken cancellation)
    {
        var scope = options["scope"] switch
        {
            "read" => TokenScope.Read,
            "write" => TokenScope.Write,
            var other => throw new UsageException($"The scope is read or write, not '{other}'."),
        };
        int? days = options.TryGetValue("days", out var text)
            ? int.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out var number) ? number : throw new UsageException($"--days takes a whole number, not '{text}'.")
            : null;
        services.GetRequiredService<StoreStartup>().OpenForVerb();
        var person = await services.GetRequiredService<IPeople>().FindByEmailAsync(options["person"], cancellation)
            ?? throw new RefusedException(RefusalKind.NotFound, $"{options["person"]} has no account on this server.");
        var issued = await services.GetRequiredService<ApiTokens>().IssueAsync(
            ServerRecords.CommandLineActor, person.Id, options.GetValueOrDefault("name", "Made at the command line"), scope,
            TokenLifetime.Of(days, services.GetRequiredService<TokenSettings>()), cancellation);
        await output.WriteLineAsync(issued.Secret);
        return 0;
    }
}
