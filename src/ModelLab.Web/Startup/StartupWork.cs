using ModelLab.Store.Keys;
using ModelLab.Store.Server;
using ModelLab.Store.Sqlite;
using ModelLab.Store.Sqlite.Starting;
using ModelLab.Web.Features.Demo;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Startup;

/// <summary>
/// What is done once, beside a server that already answers <c>/health/live</c>: the store's own start, then the demo or the set-up
/// token. A failure is logged and stops the program with exit code 1.
/// </summary>
public sealed partial class StartupWork(
    Readiness readiness, IServiceProvider services, IHostEnvironment environment, IHostApplicationLifetime lifetime, ILogger<StartupWork> log) : BackgroundService
{
    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        try
        {
            await ListeningAsync(stoppingToken);
            readiness.Now("opening the store");
            await services.GetRequiredService<StoreStartup>().StartAsync(stoppingToken);
            await FirstStartAsync(stoppingToken);
            readiness.Ready();
            LogReady();
        }
        catch (OperationCanceledException e) when (stoppingToken.IsCancellationRequested)
        {
            readiness.Failed(e);
        }
        catch (Exception e) when (e is StoreUnusableException or KeysUnusableException)
        {
            LogUnusable(e.Message);
            Stop(e);
        }
#pragma warning disable CA1031 // whatever it was, the server must not go on without it
        catch (Exception e)
#pragma warning restore CA1031
        {
            LogFailure(e, readiness.Stage);
            Stop(e);
        }
    }

    /// <summary>A stop while the web server still starts would end in a fault of its own instead of the message that tells why.</summary>
    private async Task ListeningAsync(CancellationToken cancellation)
    {
        var started = new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        await using var registration = lifetime.ApplicationStarted.Register(started.SetResult);
        await started.Task.WaitAsync(cancellation);
    }

    private async Task FirstStartAsync(CancellationToken cancellation)
    {
        var records = services.GetRequiredService<ServerRecords>();
        var unfinished = Path.Combine(services.GetRequiredService<StorageSettings>().DataFolder, "demo-unfinished");
        var empty = (await records.PeopleAsync(cancellation)).Count == 0;
        if (environment.IsDevelopment() && services.GetService<IDemoLoader>() is { } demo && (empty || File.Exists(unfinished)))
        {
            // The mark outlives a start that is broken off, so that the next one makes the demo after all; what was half made stays beside it.
            readiness.Now("making the demo project");
            await File.WriteAllBytesAsync(unfinished, [], cancellation);
            await demo.LoadAsync(cancellation);
            File.Delete(unfinished);
            LogDemo();
        }
        else if (empty && await records.CreateSetUpTokenAsync(cancellation) is { } token)
        {
            // To the console and not to the log, which may be kept somewhere that more people read.
            await Console.Out.WriteLineAsync($"First set-up: nobody has an account yet. The set-up token, which works once and until the next start: {token}");
        }
    }

    private void Stop(Exception cause)
    {
        readiness.Failed(cause);
        Environment.ExitCode = 1;
        lifetime.StopApplication();
    }

    [LoggerMessage(LogLevel.Information, "Ready")]
    private partial void LogReady();

    [LoggerMessage(LogLevel.Information, "The demo project was made")]
    private partial void LogDemo();

    [LoggerMessage(LogLevel.Critical, "The server cannot start: {Reason}")]
    private partial void LogUnusable(string reason);

    [LoggerMessage(LogLevel.Critical, "The server cannot start: it failed while {Stage}")]
    private partial void LogFailure(Exception exception, string stage);
}
