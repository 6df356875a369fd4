using ModelLab.Web.Verbs;
using Xunit;

namespace ModelLab.Web.Tests.Verbs;

public sealed class VerbArgumentsTests
{
    [Fact]
    public void Options_of_the_verb_and_settings_are_told_apart()
    {
        var arguments = VerbArguments.Parse(new CreateTokenVerb(), ["--person", "a@example.org", "--scope=read", "--ModelLab:DataFolder", "here", "--urls=http://localhost:1"]);
        Assert.Equal("a@example.org", arguments.Options["person"]);
        Assert.Equal("read", arguments.Options["scope"]);
        Assert.Equal(["--ModelLab:DataFolder=here", "--urls=http://localhost:1"], arguments.Settings);
    }

    [Theory]
    [InlineData("'create-token' needs the option --scope read|write.", "--person", "a@example.org")]
    [InlineData("'create-token' has no option --persona.", "--persona", "x")]
    [InlineData("The option --person needs a value.", "--person", "--scope")]
    [InlineData("The option --scope needs a value.", "--person", "x", "--scope")]
    [InlineData("The option --person stands twice.", "--person", "x", "--person", "y", "--scope", "read")]
    [InlineData("'x' is not expected after 'create-token'.", "x")]
    public void A_wrong_command_line_is_told(string message, params string[] words) =>
        Assert.Equal(message, Assert.Throws<UsageException>(() => VerbArguments.Parse(new CreateTokenVerb(), words)).Message);

    [Theory]
    [InlineData("http://*:8080", "http://127.0.0.1:8080/health/ready")]
    [InlineData("http://0.0.0.0:80;https://0.0.0.0:443", "http://127.0.0.1/health/ready")]
    [InlineData("http://[::]:5240", "http://[::1]:5240/health/ready")]
    [InlineData("http://10.1.2.3:5240", "http://10.1.2.3:5240/health/ready")]
    [InlineData("", "http://127.0.0.1:5240/health/ready")]
    public void The_health_of_a_server_is_asked_where_this_machine_reaches_it(string urls, string asked) => Assert.Equal(asked, HealthVerb.AddressToAsk(urls).ToString());

    [Theory]
    [InlineData("backup", "backup")]
    [InlineData("nonsense --x", "nonsense", "--x")]
    [InlineData("--help", "--help")]
    [InlineData("check --environment Development --urls=http://localhost:1", "--environment", "Development", "--urls=http://localhost:1", "check")]
    [InlineData(null, "--urls", "http://localhost:1")]
    [InlineData(null, "--environment=Testing", "--ModelLab:DataFolder", "here")]
    [InlineData(null)]
    public void The_first_word_that_is_no_setting_is_the_verb(string? found, params string[] words)
    {
        var verb = VerbLine.Find(words);
        Assert.Equal(found, verb is null ? null : string.Join(' ', verb));
    }
}
