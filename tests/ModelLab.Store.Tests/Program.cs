using ModelLab.Store.Tests.Faults;
using Xunit.MicrosoftTestingPlatform;
using Xunit.Runner.InProc.SystemConsole;

namespace ModelLab.Store.Tests;

/// <summary>Runs the tests, or, when a test asks for it, is the process that writes until it is killed.</summary>
internal static class Program
{
    public static Task<int> Main(string[] args) => args switch
    {
        [WritingProcess.Argument, var folder] => WritingProcess.RunAsync(folder),
        _ when args.Any(a => a is "--server" or "--internal-msbuild-node") => TestPlatformTestFramework.RunAsync(args, SelfRegisteredExtensions.AddSelfRegisteredExtensions),
        _ => ConsoleRunner.Run(args),
    };
}
