using System.Net;
using System.Net.Http.Headers;
using System.Text.RegularExpressions;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Verbs;

/// <summary>The real program: what it prints, how it ends, and that its verbs work beside a running server.</summary>
public sealed partial class ProgramTests
{
    [Fact]
    public async Task The_program_serves_and_its_verbs_work_beside_it()
    {
        using var program = new ProgramProcess();
        using var client = await program.ServeAsync();
        Assert.Contains($"listens on {program.Address} (Production). Its data are in {program.DataFolder}", program.Output, StringComparison.Ordinal);
        var setUp = SetUpToken().Match(program.Output).Value;
        await client.PostJsonAsync("/set-up", $$"""{"token":"{{setUp}}","email":"ada@example.org","name":"Ada Quill","password":"{{WebServer.Password}}"}""").JsonAsync(HttpStatusCode.Created);

        var health = await program.RunAsync("health");
        Assert.Equal(new ProgramResult(0, "ready\n", string.Empty), health with { Output = health.Output.ReplaceLineEndings("\n") });

        var token = await program.RunAsync("create-token", "--person", "ADA@example.org", "--scope", "write", "--days", "3");
        Assert.Equal(0, token.ExitCode);
        Assert.Matches("^ml_[A-Za-z0-9_-]{43}\r?\n$", token.Output);
        client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", token.Output.Trim());
        var project = await client.OpenProjectAsync();

        var check = await program.RunAsync("check");
        Assert.Equal(0, check.ExitCode);
        Assert.StartsWith("Nothing wrong: 2 ledgers", check.Output, StringComparison.Ordinal);

        var data = Path.Combine(program.Folder, "backup-data");
        var keys = Path.Combine(program.Folder, "backup-keys");
        var backup = await program.RunAsync("backup", "--data", data, "--keys", keys);
        Assert.True(backup.ExitCode == 0, backup.Errors);
        var restore = await program.RunAsync("restore", "--data", data, "--keys", keys, "--ModelLab:DataFolder", Path.Combine(program.Folder, "restored"));
        Assert.True(restore.ExitCode == 0, restore.Errors);
        Assert.Equal(backup.Output, restore.Output);
        var checkedAgain = await program.RunAsync("check", "--ModelLab:DataFolder", Path.Combine(program.Folder, "restored"));
        Assert.True(checkedAgain.ExitCode == 0, checkedAgain.Errors + checkedAgain.Output);

        using var second = new ProgramProcess();
        var refused = await second.RunAsync("--ModelLab:DataFolder", program.DataFolder);
        Assert.Equal(1, refused.ExitCode);
        Assert.Contains("Another ModelLab server uses the data folder", refused.Output, StringComparison.Ordinal);
        using var third = new ProgramProcess();
        var taken = await third.RunAsync("--urls", program.Address);
        Assert.Equal(1, taken.ExitCode);
        Assert.Contains("address already in use", taken.Errors, StringComparison.Ordinal);
        await client.FetchAsync($"/api/v1/projects/{project}").JsonAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task A_data_folder_that_cannot_be_made_is_said_plainly()
    {
        using var program = new ProgramProcess();
        var file = Path.Combine(program.Folder, "a-file");
        await File.WriteAllTextAsync(file, "no folder", TestContext.Current.CancellationToken);
        var result = await program.RunAsync("--ModelLab:DataFolder", Path.Combine(file, "data"));
        Assert.Equal(1, result.ExitCode);
        Assert.Contains("The folders of data and keys", result.Errors, StringComparison.Ordinal);
        Assert.DoesNotContain("Unhandled", result.Errors, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_wrong_setting_stops_the_start_with_its_name()
    {
        using var program = new ProgramProcess();
        var result = await program.RunAsync("--ModelLab:Uploads:MaximumBytes=lots");
        Assert.Equal(1, result.ExitCode);
        Assert.Equal("The setting ModelLab:Uploads:MaximumBytes is 'lots', which is no whole number.", result.Errors.Trim());
        Assert.False(Directory.Exists(program.DataFolder));
    }

    [Theory]
    [InlineData("nonsense", "'nonsense' is no verb of this program.")]
    [InlineData("backup", "'backup' needs the option --data DIR.")]
    public async Task A_wrong_command_line_ends_with_two(string word, string message)
    {
        using var program = new ProgramProcess();
        var result = await program.RunAsync(word);
        Assert.Equal(2, result.ExitCode);
        Assert.Empty(result.Output);
        Assert.StartsWith(message, result.Errors, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Help_lists_every_verb()
    {
        using var program = new ProgramProcess();
        var result = await program.RunAsync("help");
        Assert.Equal(0, result.ExitCode);
        Assert.All(new[] { "create-token --person EMAIL --scope read|write [--days N]", "backup --data DIR --keys DIR", "restore", "check", "health" },
            verb => Assert.Contains(verb, result.Output, StringComparison.Ordinal));
    }

    [Fact]
    public async Task Without_a_database_a_verb_says_so_and_makes_none()
    {
        using var program = new ProgramProcess();
        var result = await program.RunAsync("create-token", "--person", "a@example.org", "--scope", "read");
        Assert.Equal(1, result.ExitCode);
        Assert.Empty(result.Output);
        Assert.Contains("There is no database", result.Errors, StringComparison.Ordinal);
        Assert.False(Directory.Exists(program.DataFolder));
        Assert.Equal(1, (await program.RunAsync("health")).ExitCode);
    }

    [GeneratedRegex("set-up-[A-Za-z0-9_-]{43}")]
    private static partial Regex SetUpToken();
}
