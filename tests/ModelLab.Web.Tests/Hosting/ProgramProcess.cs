using System.Diagnostics;
using System.Net;
using System.Net.Sockets;
using System.Text;
using Xunit;

namespace ModelLab.Web.Tests.Hosting;

/// <summary>What a finished program said.</summary>
public sealed record ProgramResult(int ExitCode, string Output, string Errors);

/// <summary>The real program in a process of its own, on a data folder of its own.</summary>
public sealed class ProgramProcess : IDisposable
{
    private readonly string folder = Directory.CreateTempSubdirectory("modellab-program-").FullName;
    private readonly StringBuilder output = new();
    private readonly StringBuilder errors = new();
    private Process? process;

    public ProgramProcess()
    {
        using var listener = new TcpListener(IPAddress.Loopback, 0);
        listener.Start();
        Address = $"http://127.0.0.1:{((IPEndPoint)listener.LocalEndpoint).Port}";
    }

    public string Address { get; }

    public string DataFolder => Path.Combine(folder, "data");

    public string Folder => folder;

    /// <summary>Environment variables of the next run, beside and before the usual ones.</summary>
    public Dictionary<string, string> Environment { get; } = new(StringComparer.Ordinal);

    public string Output
    {
        get
        {
            lock (output)
            {
                return output.ToString();
            }
        }
    }

    public string Errors
    {
        get
        {
            lock (errors)
            {
                return errors.ToString();
            }
        }
    }

    /// <summary>Runs the program to its end.</summary>
    public async Task<ProgramResult> RunAsync(params string[] arguments)
    {
        using var run = Launch(arguments);
        var said = run.StandardOutput.ReadToEndAsync(TestContext.Current.CancellationToken);
        var complained = run.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken);
        await run.WaitForExitAsync(TestContext.Current.CancellationToken);
        return new ProgramResult(run.ExitCode, await said, await complained);
    }

    /// <summary>Starts the server and waits until it is ready, or has ended.</summary>
    public async Task<HttpClient> ServeAsync(params string[] arguments)
    {
        process = Launch(arguments);
        process.OutputDataReceived += (_, line) => Append(output, line.Data);
        process.ErrorDataReceived += (_, line) => Append(errors, line.Data);
        process.BeginOutputReadLine();
        process.BeginErrorReadLine();
        var client = new HttpClient { BaseAddress = new Uri(Address) };
        while (true)
        {
            Assert.False(process.HasExited, $"The server ended: {Output} {Errors}");
            try
            {
                using var answer = await client.GetAsync("/health/ready", TestContext.Current.CancellationToken);
                if (answer.IsSuccessStatusCode)
                {
                    return client;
                }
            }
            catch (HttpRequestException)
            {
                // It does not listen yet.
            }

            await Task.Delay(100, TestContext.Current.CancellationToken);
        }
    }

    /// <summary>Ends the server, as a power cut would.</summary>
    public void Stop()
    {
        if (process is { HasExited: false })
        {
            process.Kill(entireProcessTree: true);
            process.WaitForExit();
        }

        process?.Dispose();
        process = null;
    }

    public void Dispose()
    {
        Stop();
        Directory.Delete(folder, recursive: true);
    }

    private static void Append(StringBuilder text, string? line)
    {
        lock (text)
        {
            text.AppendLine(line);
        }
    }

    private Process Launch(string[] arguments)
    {
        var start = new ProcessStartInfo("dotnet")
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            WorkingDirectory = folder,
        };
        start.ArgumentList.Add(Path.Combine(AppContext.BaseDirectory, "ModelLab.Web.dll"));
        foreach (var argument in arguments)
        {
            start.ArgumentList.Add(argument);
        }

        start.Environment["ASPNETCORE_URLS"] = Address;
        start.Environment["ASPNETCORE_ENVIRONMENT"] = "Production";
        start.Environment["ModelLab__DataFolder"] = DataFolder;
        foreach (var (name, value) in Environment)
        {
            start.Environment[name] = value;
        }

        return Process.Start(start)!;
    }
}
