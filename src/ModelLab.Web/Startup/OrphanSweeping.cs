using ModelLab.Store.Vault;

namespace ModelLab.Web.Startup;

/// <summary>Sweeps sources that no entry took up, every hour: uploads that broke off.</summary>
public sealed partial class OrphanSweeping(Readiness readiness, OrphanSweep sweep, TimeProvider clock, ILogger<OrphanSweeping> log) : BackgroundService
{
    private static readonly TimeSpan Pause = TimeSpan.FromHours(1);

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        try
        {
            await readiness.Done.WaitAsync(stoppingToken);
        }
#pragma warning disable CA1031 // why the start failed is told by the start itself
        catch (Exception)
#pragma warning restore CA1031
        {
            return;
        }

        using var timer = new PeriodicTimer(Pause, clock);
        while (await timer.WaitForNextTickAsync(stoppingToken))
        {
            try
            {
                await sweep.SweepAsync(atStart: false, stoppingToken);
            }
            catch (IOException e)
            {
                LogFailure(e);
            }
        }
    }

    [LoggerMessage(LogLevel.Warning, "Sources that no entry took up could not be swept; the next try is in an hour")]
    private partial void LogFailure(Exception exception);
}
