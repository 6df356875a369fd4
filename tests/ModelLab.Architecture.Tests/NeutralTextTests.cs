using ModelLab.Architecture.Tests.Reading;
using ModelLab.Architecture.Tests.Rules;

namespace ModelLab.Architecture.Tests;

public sealed class NeutralTextTests
{
    [Fact]
    public void Nothing_in_the_tree_names_a_registry_or_a_folder_of_one_machine()
    {
        var files = RepositoryTree.TextFiles().ToList();
        Assert.Contains(files, f => f.Path == "Directory.Packages.props");
        Offenders.None("The tree builds anywhere.", NeutralTextRule.Violations(files));
    }

    // The texts are put together here, so that this file does not break the rule itself.
    [Theory]
    [InlineData("https://api.nu", "get.org/v3/index.json", true)]
    [InlineData("see Registry.NPMJS", ".org", true)]
    [InlineData("cd /wo", "rk/house && make", true)]
    [InlineData("file=\"/tm", "p/x.csv\"", true)]
    [InlineData("=/ro", "ot/.config", true)]
    [InlineData("C:", "\\Users\\someone", true)]
    [InlineData("tmpfs: /tm", "p", false)]
    [InlineData("https://example.org/ho", "me/page", false)]
    [InlineData("../ro", "ot/file", false)]
    [InlineData("docs/wo", "rk/file", false)]
    public void Violation_a_host_or_a_folder_is_found_with_its_line(string first, string second, bool offends)
    {
        var offenders = NeutralTextRule.Violations([new TextFile("notes.md", "plain\n" + first + second + "\n")]).ToList();
        Assert.Equal(offends ? 1 : 0, offenders.Count);
        Assert.All(offenders, o => Assert.StartsWith("notes.md(2) names ", o, StringComparison.Ordinal));
    }
}
