using System.Diagnostics;
using System.Globalization;

namespace ModelLab.Benchmarks;

/// <summary>The peers: one Python process that does a workload when its name comes in, and answers with the CPU time of one run.</summary>
public sealed class PeerProcess : IDisposable
{
    private readonly Process process;
    private readonly HashSet<string> names;

    private PeerProcess(Process process, IEnumerable<string> names)
    {
        this.process = process;
        this.names = [.. names];
    }

    /// <summary>Starts them; null where Python or numpy is missing.</summary>
    /// <param name="folder">Folder with the data.</param>
    public static PeerProcess? Start(string folder)
    {
        var start = new ProcessStartInfo("/usr/bin/python3", [Path.Combine(AppContext.BaseDirectory, "peers.py"), folder])
        {
            RedirectStandardInput = true,
            RedirectStandardOutput = true,
        };

        // One thread on either side. Settings that pick another kernel for the machine slow the peers down and are taken away.
        start.Environment["OPENBLAS_NUM_THREADS"] = "1";
        start.Environment.Remove("OPENBLAS_CORETYPE");
        start.Environment.Remove("OPENBLAS_L2_SIZE");
        try
        {
            var process = Process.Start(start)!;
            var names = process.StandardOutput.ReadLine();
            if (names is not null)
            {
                return new PeerProcess(process, names.Split(' ', StringSplitOptions.RemoveEmptyEntries));
            }

            process.Dispose();
        }
        catch (System.ComponentModel.Win32Exception)
        {
            // No Python on this machine: our own times are shown alone.
        }

        return null;
    }

    /// <summary>Whether a peer can be run on this machine.</summary>
    public bool Has(string name) => names.Contains(name);

    /// <summary>CPU time of one run, in milliseconds.</summary>
    public double Run(string name)
    {
        process.StandardInput.WriteLine(name);
        process.StandardInput.Flush();
        var answer = process.StandardOutput.ReadLine() ?? throw new InvalidOperationException($"The peer {name} ended without an answer.");
        return double.Parse(answer, CultureInfo.InvariantCulture);
    }

    /// <summary>Ends the process.</summary>
    public void Dispose()
    {
        process.StandardInput.Close();
        process.WaitForExit();
        process.Dispose();
    }
}
