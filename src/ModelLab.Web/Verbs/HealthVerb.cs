using ModelLab.Web.Startup;

namespace ModelLab.Web.Verbs;

/// <summary>Asks a running server whether it is ready: the health check of a container.</summary>
public sealed class HealthVerb : IVerb
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(5);

    /// <inheritdoc/>
    public string Name => "health";

    /// <inheritdoc/>
    public string Summary => "Asks the server at the address of the settings whether it is ready. Ends with 1 if it is not.";

    /// <inheritdoc/>
    public IReadOnlyList<VerbOption> Options { get; } = [];

    /// <summary>The address at which this machine reaches a server that listens on the addresses of the setting <c>urls</c>.</summary>
    public static Uri AddressToAsk(string urls)
    {
        var first = urls.Split(';', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries).FirstOrDefault() ?? ServerHost.DefaultAddress;
        var address = first.Replace("//*", "//127.0.0.1", StringComparison.Ordinal).Replace("//+", "//127.0.0.1", StringComparison.Ordinal)
            .Replace("//0.0.0.0", "//127.0.0.1", StringComparison.Ordinal).Replace("//[::]", "//[::1]", StringComparison.Ordinal);
        return new Uri(new Uri(address), "/health/ready");
    }

    /// <inheritdoc/>
    public async Task<int> RunAsync(IReadOnlyDictionary<string, string> options, IServiceProvider services, TextWriter output, CancellationToken cancellation)
    {
        var address = AddressToAsk(services.GetRequiredService<IConfiguration>()[WebHostDefaults.ServerUrlsKey] ?? ServerHost.DefaultAddress);
        using var client = new HttpClient { Timeout = Patience };
        try
        {
            using var answer = await client.GetAsync(address, cancellation);
            await output.WriteLineAsync(answer.IsSuccessStatusCode ? "ready" : $"not ready ({(int)answer.StatusCode})");
            return answer.IsSuccessStatusCode ? 0 : 1;
        }
        catch (Exception e) when (e is HttpRequestException or TaskCanceledException)
        {
            await output.WriteLineAsync($"no answer from {address}");
            return 1;
        }
    }
}
