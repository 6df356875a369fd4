using ModelLab.Web.Settings;
using ModelLab.Web.Startup;

try
{
    await ServerHost.Build(args).RunAsync();
    return Environment.ExitCode;
}
catch (SettingsRefusedException e)
{
    await Console.Error.WriteLineAsync(e.Message);
    return 1;
}
