using Microsoft.Extensions.Configuration.Memory;
using ModelLab.Projects;
using ModelLab.Store.Sqlite;
using ModelLab.Web.Features.ApiReference;
using ModelLab.Web.Features.Demo;
using ModelLab.Web.Features.Health;
using ModelLab.Web.Features.SignIn;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Startup;

/// <summary>Puts the server together: settings, services, the order of what a request passes, endpoints.</summary>
public static class ServerHost
{
    /// <summary>Where the server listens when the setting <c>urls</c> says nothing.</summary>
    public const string DefaultAddress = "http://127.0.0.1:5240";

    /// <summary>Builds the server; it does not run yet.</summary>
    /// <exception cref="SettingsRefusedException">Settings are wrong.</exception>
    public static WebApplication Build(string[] args)
    {
        var builder = CreateBuilder(args, out var settings);
        builder.AddServerServices(settings);
        var app = builder.Build();
        app.UseServerPipeline(settings);
        app.MapServerEndpoints(settings);
        app.AnnounceWhenListening();
        return app;
    }

    /// <summary>Builds the program for a verb: settings and store, no web server; logs go to standard error.</summary>
    /// <exception cref="SettingsRefusedException">Settings are wrong.</exception>
    public static WebApplication BuildForVerb(string[] args) => CreateBuilder(args, out _, logToStandardError: true).Build();

    /// <summary>A builder with the program's defaults below all other sources of settings, and the settings read and checked.</summary>
    /// <exception cref="SettingsRefusedException">Settings are wrong.</exception>
    public static WebApplicationBuilder CreateBuilder(string[] args, out ServerSettings settings, bool logToStandardError = false)
    {
        var builder = WebApplication.CreateBuilder(args);
        ((IConfigurationBuilder)builder.Configuration).Sources.Insert(0, new MemoryConfigurationSource { InitialData = Defaults });
        builder.Logging.ClearProviders();
        builder.Logging.AddSimpleConsole(o =>
        {
            o.SingleLine = true;
            o.UseUtcTimestamp = true;
            o.TimestampFormat = "yyyy-MM-dd'T'HH:mm:ss'Z' ";
        });
        if (logToStandardError)
        {
            builder.Services.Configure<Microsoft.Extensions.Logging.Console.ConsoleLoggerOptions>(o => o.LogToStandardErrorThreshold = LogLevel.Trace);
        }

        settings = ServerSettings.Read(builder.Configuration, builder.Environment);
        builder.Services.AddSettings(settings);
        builder.Services.AddSingleton(TimeProvider.System);
        builder.Services.AddModelLabSqliteStore(settings.Storage.ToStore());
        return builder;
    }

    /// <summary>In memory and not in a file, so that they hold wherever the program is started from.</summary>
    private static Dictionary<string, string?> Defaults => new()
    {
        [WebHostDefaults.ServerUrlsKey] = DefaultAddress,
        ["Logging:LogLevel:Default"] = "Information",
        ["Logging:LogLevel:Microsoft"] = "Warning",

        // That the keys of sessions lie unencrypted in the folder of the keys is known: the folder is the server's alone.
        ["Logging:LogLevel:Microsoft.AspNetCore.DataProtection"] = "Error",
        ["Logging:LogLevel:Microsoft.Hosting.Lifetime"] = "Information",
    };

    private static void AddSettings(this IServiceCollection services, ServerSettings settings)
    {
        services.AddSingleton(settings);
        services.AddSingleton(settings.Storage);
        services.AddSingleton(settings.Uploads);
        services.AddSingleton(settings.SignIn);
        services.AddSingleton(settings.Tokens);
        services.AddSingleton(settings.Proxies);
    }

    private static void AddServerServices(this WebApplicationBuilder builder, ServerSettings settings)
    {
        builder.WebHost.ConfigureKestrel(kestrel =>
        {
            kestrel.AddServerHeader = false;
            kestrel.Limits.MaxRequestBodySize = settings.Storage.MaximumRequestBytes;
        });
        builder.Services.AddSingleton<Readiness>();
        builder.Services.AddHostedService<StartupWork>();
        builder.Services.AddHostedService<OrphanSweeping>();
        builder.Services.AddApiPlumbing();
        builder.Services.AddSignIn(settings);
        builder.Services.AddModelLabProjects();
        if (builder.Environment.IsDevelopment())
        {
            builder.Services.AddDemo();
        }

        builder.Services.AddApiDescription();
    }

    /// <summary>
    /// The order matters: headers go on every answer; whatever fails inside becomes a problem; what comes from another site goes no
    /// further; who calls is known before a request is looked up by its key.
    /// </summary>
    private static void UseServerPipeline(this WebApplication app, ServerSettings settings)
    {
        app.UseForwardedAddresses(settings.Proxies);
        app.UseMiddleware<SecurityHeaders>();
        app.UseExceptionHandler();
        app.UseStatusCodePages(context => StatusProblems.WriteAsync(context.HttpContext));
        app.UseMiddleware<ReadinessGate>();
        app.UseMiddleware<CrossSiteRequests>();
        app.UseRouting();
        app.UseRateLimiter();
        app.UseAuthentication();
        app.UseAuthorization();
        app.UseMiddleware<TokenScopeGate>();
        app.UseMiddleware<IdempotencyGate>();
    }

    private static void MapServerEndpoints(this WebApplication app, ServerSettings settings)
    {
        app.MapHealth();
        app.MapSignIn();
        app.MapApiReference();
        app.MapApi(settings);
    }
}
