using System.Net;
using System.Net.Http.Headers;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Features.Ledgers;

/// <summary>
/// The demo project, made with all that the processor has, replays bit for bit in a process that may use less of it. What each process
/// uses is read off its own log first, so that a switch without effect does not pass for a success.
/// </summary>
public sealed class ReplayOnOtherProcessorsTests
{
    [Fact]
    public async Task A_project_replays_bit_for_bit_with_narrower_vectors_and_with_one_processor()
    {
        using var program = new ProgramProcess { Environment = { ["ASPNETCORE_ENVIRONMENT"] = "Development" } };
        (await program.ServeAsync()).Dispose();
        program.Stop();
        var token = (await program.RunAsync("create-token", "--person", "analyst@marrowvale.example", "--scope", "read")).Output.Trim();

        await ReplayAsync(program, token, "DOTNET_EnableAVX512", "0", said => !said.Contains("vectors of 512 bits", StringComparison.Ordinal));
        await ReplayAsync(program, token, "DOTNET_EnableAVX2", "0", said => said.Contains("vectors of 128 bits", StringComparison.Ordinal));
        await ReplayAsync(program, token, "DOTNET_PROCESSOR_COUNT", "1", said => said.Contains("on 1 processor(s)", StringComparison.Ordinal));
        await ReplayAsync(program, token, "DOTNET_PROCESSOR_COUNT", "2", said => said.Contains("on 2 processor(s)", StringComparison.Ordinal));
    }

    private static async Task ReplayAsync(ProgramProcess program, string token, string name, string value, Predicate<string> took)
    {
        var before = program.Output.Length;
        program.Environment[name] = value;
        using var client = await program.ServeAsync();
        client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", token);
        var project = (await client.FetchAsync("/api/v1/projects").JsonAsync(HttpStatusCode.OK))[0]!.Text("id");
        var replay = await client.PostJsonAsync($"/api/v1/projects/{project}/replay", "{}").JsonAsync(HttpStatusCode.OK);
        program.Stop();
        program.Environment.Remove(name);

        Assert.True(took(program.Output[before..]), $"{name}={value} had no effect: {program.Output[before..]}");
        Assert.True(replay["ok"]!.GetValue<bool>());
        var revisions = replay["revisions"]!.AsArray();
        Assert.True(revisions.Count >= 5);
        Assert.All(revisions, r => Assert.Equal(0, r!["largestRelativeDifference"]!.GetValue<double>()));
    }
}
