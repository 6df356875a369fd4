using System.Diagnostics;
using System.Globalization;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;
using System.Security.Cryptography;
using ModelLab.Statistics.Inference;

namespace ModelLab.Statistics.Tests.LeastSquares;

/// <summary>
/// The bits of a fit do not depend on the width of the processor's vectors or on the number of its threads. The same test program is
/// started again with narrower vectors or one processor, writes what it sees of the switches and the bits of its fits into a file, and
/// the files are compared.
/// </summary>
public sealed class DeterminismTests(ITestOutputHelper output)
{
    private const string Target = "MODELLAB_BITS_FILE";

    [Fact]
    public void Writes_its_bits_where_a_parent_asks_for_them()
    {
        var lines = Bits().ToArray();
        Assert.Equal(4, lines.Distinct().Count());
        if (Environment.GetEnvironmentVariable(Target) is { Length: > 0 } path)
        {
            File.WriteAllLines(path, [.. Switches(), .. lines]);
        }
    }

    [Fact]
    public async Task Vectors_of_half_the_width_give_the_same_bits()
    {
        var found = await Run(("DOTNET_EnableAVX512", "0"));
        Assert.Equal("False", found["Vector512"]);
        Same(found);
    }

    [Fact]
    public async Task Vectors_of_a_quarter_of_the_width_without_fused_arithmetic_give_the_same_bits()
    {
        var found = await Run(("DOTNET_EnableAVX2", "0"));
        Assert.Equal("False", found["Vector512"]);
        Assert.Equal("False", found["Vector256"]);
        Assert.Equal("False", found["Avx2"]);
        Same(found);
    }

    [Theory]
    [InlineData("1")]
    [InlineData("7")]
    public async Task Any_number_of_threads_gives_the_same_bits(string processors)
    {
        var found = await Run(("DOTNET_PROCESSOR_COUNT", processors));
        Assert.Equal(processors, found["Processors"]);
        Same(found);
    }

    private static IEnumerable<string> Switches() =>
    [
        $"Vector512={Vector512.IsHardwareAccelerated}",
        $"Vector256={Vector256.IsHardwareAccelerated}",
        $"Avx2={Avx2.IsSupported}",
        string.Create(CultureInfo.InvariantCulture, $"Processors={Environment.ProcessorCount}"),
    ];

    private static IEnumerable<string> Bits()
    {
        yield return $"filip={Hash(ReferenceFit.OfLinear("Filip"))}";
        yield return $"penguins={Hash(ReferenceFit.OfWorked("penguins"))}";
        yield return $"wide={Hash(SampleTable.Fit(SampleTable.Create(600, 12, 7, 5), [.. Enumerable.Range(1, 12).Select(i => $"x{i}"), "g"]))}";

        // Long enough for two stretches that threads share.
        yield return $"long={Hash(SampleTable.Fit(SampleTable.Create(33_000, 2, 7), "x1", "x2"))}";
    }

    private static string Hash(FittedModel model)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        void Add(double? value) => hash.AppendData(BitConverter.GetBytes(value ?? double.NaN));
        var rows = model.Rows();
        foreach (var value in rows.Fitted.Concat(rows.Residual).Concat(rows.Leverage))
        {
            Add(value);
        }

        foreach (var value in rows.StudentizedInternal.Concat(rows.StudentizedExternal).Concat(rows.CooksDistance))
        {
            Add(value);
        }

        var fit = model.Results.Fit;
        double?[] figures = [fit.S, fit.RSquared, fit.F, fit.P, fit.Press, fit.LogLikelihood, fit.Aic, fit.Aicc, fit.Bic, fit.SsResidual, fit.SsTotal];
        Array.ForEach(figures, Add);
        foreach (var c in model.Results.Coefficients)
        {
            double?[] own = [c.Estimate, c.StandardError, c.T, c.P, c.Lower, c.Upper, c.Standardized, c.PartialR, c.SemiPartialR, c.Vif];
            Array.ForEach(own, Add);
        }

        foreach (var loss in model.Results.Losses)
        {
            double?[] own = [loss.SumOfSquares, loss.F, loss.P, loss.RSquaredLoss, loss.AdjustedRSquaredChange, loss.AicChange, loss.AiccChange, loss.BicChange];
            Array.ForEach(own, Add);
        }

        return Convert.ToHexString(hash.GetHashAndReset());
    }

    private static void Same(Dictionary<string, string> found)
    {
        foreach (var line in Bits())
        {
            var name = line.Split('=')[0];
            Assert.Equal(line, $"{name}={found[name]}");
        }
    }

    private async Task<Dictionary<string, string>> Run(params (string Name, string Value)[] switches)
    {
        var path = Path.Combine(Path.GetTempPath(), $"modellab-bits-{Guid.NewGuid():N}.txt");
        try
        {
            using var process = Process.Start(Child(path, switches))!;
            using var patience = new CancellationTokenSource(TimeSpan.FromMinutes(5)); // ends a child that hangs, no measure of speed
            var said = process.StandardOutput.ReadToEndAsync(patience.Token);
            var complained = process.StandardError.ReadToEndAsync(patience.Token);
            try
            {
                await process.WaitForExitAsync(patience.Token);
            }
            catch (OperationCanceledException)
            {
                process.Kill(entireProcessTree: true);
                throw;
            }

            Assert.True(process.ExitCode == 0 && File.Exists(path), $"The child ended with {process.ExitCode}: {await said} {await complained}");
            var found = (await File.ReadAllLinesAsync(path, patience.Token)).Select(line => line.Split('=')).ToDictionary(parts => parts[0], parts => parts[1]);
            output.WriteLine($"{string.Join(' ', switches)}: {string.Join(", ", found.Select(pair => $"{pair.Key} {pair.Value}"))}");
            return found;
        }
        finally
        {
            File.Delete(path);
        }
    }

    private static ProcessStartInfo Child(string path, (string Name, string Value)[] switches)
    {
        // Whether the tests run as their own program or under the dotnet host, the assembly can be run by the host.
        var host = Path.GetFileNameWithoutExtension(Environment.ProcessPath!) == "dotnet" ? Environment.ProcessPath! : "dotnet";
        var start = new ProcessStartInfo(host)
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            UseShellExecute = false,
        };
        start.ArgumentList.Add(typeof(DeterminismTests).Assembly.Location);
        start.ArgumentList.Add("-noColor");
        start.ArgumentList.Add("-method");
        start.ArgumentList.Add($"{typeof(DeterminismTests).FullName}.{nameof(Writes_its_bits_where_a_parent_asks_for_them)}");
        foreach (var name in start.Environment.Keys.Where(IsSwitch).ToArray())
        {
            start.Environment.Remove(name);
        }

        foreach (var (name, value) in switches)
        {
            start.Environment[name] = value;
        }

        start.Environment[Target] = path;
        return start;
    }

    // What a test platform passes on to its children would make the child report to it.
    private static bool IsSwitch(string name) =>
        name.StartsWith("TESTINGPLATFORM_", StringComparison.OrdinalIgnoreCase)
        || name.StartsWith("DOTNET_Enable", StringComparison.OrdinalIgnoreCase)
        || name.Equals("DOTNET_PROCESSOR_COUNT", StringComparison.OrdinalIgnoreCase)
        || name.Equals(Target, StringComparison.OrdinalIgnoreCase);
}
