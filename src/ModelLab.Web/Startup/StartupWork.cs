using ModelLab.Web.Features.Demo;

namespace ModelLab.Web.Startup;

/// <summary>
/// What is done once, beside a server that already answers <c>/health/live</c>: the store's own start, then the demo.
/// A failure is logged and stops the program with exit code 1.
/// </summary>
public sealed partial class StartupWork(
    Readiness readiness, IServiceProvider services, IHostEnvironment environment, IHostApplicationLifetime lifetime, ILogger<StartupWork> log) : BackgroundService
{
    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        try
        {
            if (environment.IsDevelopment() && services.GetService<IDemoLoader>() is { } demo)
            {
                readiness.Now("making the demo project");
                await demo.LoadAsync(stoppingToken);
            }

            readiness.Ready();
        }
        catch (OperationCanceledException e) when (stoppingToken.IsCancellationRequested)
        {
            readiness.Failed(e);
        }
#pragma warning disable CA1031 // whatever it was, the server must not go on without it
        catch (Exception e)
#pragma warning restore CA1031
        {
            LogFailure(e, readiness.Stage);
            readiness.Failed(e);
            Environment.ExitCode = 1;
            lifetime.StopApplication();
        }
    }

    [LoggerMessage(LogLevel.Critical, "The server cannot start: it failed while {Stage}")]
    private partial void LogFailure(Exception exception, string stage);
}
