using System.Net;
using System.Net.Http.Headers;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Startup;

/// <summary>The demo is made once, and made after all where the first start was broken off.</summary>
public sealed class DemoStartTests
{
    [Fact]
    public async Task The_demo_is_made_once_and_again_only_after_a_start_that_was_broken_off()
    {
        using var program = new ProgramProcess { Environment = { ["ASPNETCORE_ENVIRONMENT"] = "Development" } };
        (await program.ServeAsync()).Dispose();
        program.Stop();
        var token = (await program.RunAsync("create-token", "--person", "analyst@marrowvale.example", "--scope", "read")).Output.Trim();
        Assert.Equal([4], await PathsAsync(program, token));

        // What a start leaves that was broken off while it made the demo.
        var mark = Path.Combine(program.DataFolder, "demo-unfinished");
        await File.WriteAllBytesAsync(mark, [], TestContext.Current.CancellationToken);
        Assert.Equal([4, 4], await PathsAsync(program, token));
        Assert.False(File.Exists(mark));
    }

    private static async Task<List<int>> PathsAsync(ProgramProcess program, string token)
    {
        using var client = await program.ServeAsync();
        client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", token);
        var paths = new List<int>();
        foreach (var project in (await client.FetchAsync("/api/v1/projects").JsonAsync(HttpStatusCode.OK)).AsArray())
        {
            paths.Add((await client.FetchAsync($"/api/v1/projects/{project!.Text("id")}/paths").JsonAsync(HttpStatusCode.OK)).AsArray().Count);
        }

        program.Stop();
        return paths;
    }
}
