namespace ModelLab.Web.Settings;

/// <summary>All settings of the server, one class an area, read and checked before anything else happens.</summary>
public sealed class ServerSettings
{
    /// <summary>The section under which all of them stand.</summary>
    public const string Root = "ModelLab";

    private ServerSettings(SettingsReader reader)
    {
        Storage = reader.Read<StorageSettings>(Root, [nameof(Uploads), nameof(SignIn), nameof(Tokens), nameof(Proxies)]);
        Uploads = reader.Read<UploadSettings>($"{Root}:{nameof(Uploads)}");
        SignIn = reader.Read<SignInSettings>($"{Root}:{nameof(SignIn)}");
        Tokens = reader.Read<TokenSettings>($"{Root}:{nameof(Tokens)}");
        Proxies = reader.Read<ProxySettings>($"{Root}:{nameof(Proxies)}");
    }

    /// <summary>Folders and the size of requests.</summary>
    public StorageSettings Storage { get; }

    /// <summary>Uploads.</summary>
    public UploadSettings Uploads { get; }

    /// <summary>Passwords, sessions, lock-out.</summary>
    public SignInSettings SignIn { get; }

    /// <summary>API tokens.</summary>
    public TokenSettings Tokens { get; }

    /// <summary>Reverse proxies.</summary>
    public ProxySettings Proxies { get; }

    /// <summary>Reads all settings; folders are made absolute.</summary>
    /// <exception cref="SettingsRefusedException">Any is wrong or unknown; all of them are named.</exception>
    public static ServerSettings Read(IConfiguration configuration, IHostEnvironment environment)
    {
        var reader = new SettingsReader(configuration);
        var settings = new ServerSettings(reader);
        List<SettingProblem> problems = [.. reader.Problems, .. Foreign(configuration)];
        if (problems.Count > 0)
        {
            throw new SettingsRefusedException(problems);
        }

        settings.Storage.Settle(environment.ContentRootPath, environment.IsDevelopment());
        return settings;
    }

    /// <summary>Settings of the framework that would undo one of ours without a word.</summary>
    private static IEnumerable<SettingProblem> Foreign(IConfiguration configuration)
    {
        if (configuration.GetSection("Kestrel:Endpoints").GetChildren().Any())
        {
            yield return new SettingProblem("Kestrel:Endpoints", "would override the address, which comes from the setting urls alone: take it out.");
        }

        if (bool.TryParse(configuration["FORWARDEDHEADERS_ENABLED"], out var believed) && believed)
        {
            yield return new SettingProblem("FORWARDEDHEADERS_ENABLED", $"would believe forwarded headers from anyone: name the proxies under {Root}:{nameof(Proxies)} instead.");
        }

        foreach (var address in (configuration["urls"] ?? string.Empty).Split(';', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries))
        {
            // A host may be * or +, which Uri does not read.
            var readable = address.Replace("//*", "//any", StringComparison.Ordinal).Replace("//+", "//any", StringComparison.Ordinal);
            if (!Uri.TryCreate(readable, UriKind.Absolute, out var uri) || uri.Scheme is not ("http" or "https"))
            {
                yield return new SettingProblem("urls", $"holds '{address}', which is no address such as http://127.0.0.1:5240.");
            }
        }
    }
}
