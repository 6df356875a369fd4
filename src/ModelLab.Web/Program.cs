using System.Net.Sockets;
using ModelLab.Store;
using ModelLab.Web.Settings;
using ModelLab.Web.Startup;
using ModelLab.Web.Verbs;

if (VerbLine.Find(args) is { } words)
{
    return await VerbLine.RunAsync(words, Console.Out, Console.Error, CancellationToken.None);
}

try
{
    await ServerHost.Build(args).RunAsync();
    return Environment.ExitCode;
}
catch (Exception e) when (e is SettingsRefusedException or StoreSettingsException or IOException or SocketException)
{
    // Besides wrong settings: an address that is in use, or that this account may not take.
    await Console.Error.WriteLineAsync(e.Message);
    return 1;
}
