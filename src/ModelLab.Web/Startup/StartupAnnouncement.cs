using System.Runtime.Intrinsics;
using Microsoft.AspNetCore.Hosting.Server;
using Microsoft.AspNetCore.Hosting.Server.Features;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Startup;

/// <summary>Says in the log where the server listens and where its data are.</summary>
public static partial class StartupAnnouncement
{
    /// <summary>Says it as soon as the server listens.</summary>
    public static void AnnounceWhenListening(this WebApplication app)
    {
        var settings = app.Services.GetRequiredService<StorageSettings>();
        app.Lifetime.ApplicationStarted.Register(() =>
        {
            var addresses = app.Services.GetRequiredService<IServer>().Features.Get<IServerAddressesFeature>()?.Addresses ?? [];
            LogListening(app.Logger, string.Join(", ", addresses), app.Environment.EnvironmentName, settings.DataFolder, settings.KeysFolder);
            LogArithmetic(app.Logger, Vector512.IsHardwareAccelerated ? 512 : Vector256.IsHardwareAccelerated ? 256 : 128, Environment.ProcessorCount);
        });
    }

    [LoggerMessage(LogLevel.Information, "It computes with vectors of {Bits} bits on {Processors} processor(s); results depend on neither")]
    private static partial void LogArithmetic(ILogger logger, int bits, int processors);

    [LoggerMessage(LogLevel.Information, "ModelLab listens on {Addresses} ({Environment}). Its data are in {DataFolder}, its keys in {KeysFolder}")]
    private static partial void LogListening(ILogger logger, string addresses, string environment, string dataFolder, string keysFolder);
}
