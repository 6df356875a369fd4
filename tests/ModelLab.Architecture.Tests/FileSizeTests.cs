using ModelLab.Architecture.Tests.Reading;
using ModelLab.Architecture.Tests.Rules;

namespace ModelLab.Architecture.Tests;

public sealed class FileSizeTests
{
    [Fact]
    public void No_source_file_outgrows_a_few_screens()
    {
        var files = RepositoryTree.Files.Where(FileSizeRule.Covers).Select(RepositoryTree.Read).ToList();
        Assert.True(files.Count > 20, "The scan found hardly any source: it looks in the wrong place.");
        Offenders.None($"A file under src/ has at most {FileSizeRule.Most} lines.", FileSizeRule.Violations(files));
    }

    [Theory]
    [InlineData("src/ModelLab.Projects/Paths/Everything.cs", 501, true)]
    [InlineData("src/ModelLab.Web/Features/Paths/PathMap.razor", 900, true)]
    [InlineData("src/ModelLab.Projects/Paths/Everything.cs", 500, false)]
    [InlineData("src/ModelLab.Store.Sqlite/Migrations/First.cs", 900, false)]
    [InlineData("src/ModelLab.Web/Features/Demo/Data/table.csv", 900, false)]
    [InlineData("tests/ModelLab.Ledger.Tests/Vectors.cs", 900, false)]
    public void Violation_a_file_of_too_many_lines_is_found(string path, int lines, bool offends)
    {
        var file = new TextFile(path, string.Concat(Enumerable.Repeat("x\n", lines)));
        Assert.Equal(offends ? [$"{path} has {lines} lines"] : [], FileSizeRule.Violations([file]));
    }
}
