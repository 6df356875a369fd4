using ModelLab.Intake.Csv;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>Palmer penguins (Gorman, Williams &amp; Fraser 2014; CC0). Counts by Python's csv module; 333 rows are complete, as published.</summary>
public sealed class PenguinsTests
{
    private static readonly TableProfile Profile = CsvTable.Profile(() => File.OpenRead(Fixture.Path("penguins.csv")), new CsvOptions());

    [Theory]
    [InlineData("species", VariableKind.Categorical, false, 0, 3)]
    [InlineData("island", VariableKind.Categorical, false, 0, 3)]
    [InlineData("beak_length_mm", VariableKind.Continuous, true, 2, 164)]
    [InlineData("beak_depth_mm", VariableKind.Continuous, true, 2, 80)]
    [InlineData("flipper_length_mm", VariableKind.Continuous, true, 2, 55)]
    [InlineData("body_mass_g", VariableKind.Continuous, true, 2, 94)]
    [InlineData("sex", VariableKind.Binary, false, 11, 2)]
    public void Kinds_and_counts_of_each_column(string name, VariableKind kind, bool numeric, long missing, long distinct)
    {
        var column = Profile.Columns.Single(c => c.Name == name);

        Assert.Equal(kind, column.ProposedKind);
        Assert.Equal(numeric, column.Numeric);
        Assert.Equal(missing, column.Missing);
        Assert.Equal(distinct, column.Distinct);
        Assert.Equal(missing > 0 ? new[] { "" } : [], column.MissingCodes);
        Assert.Empty(column.Questions);
    }

    [Fact]
    public void Rows_dialect_and_counts_of_categories()
    {
        Assert.Equal(344, Profile.Rows);
        Assert.Equal(new CsvDialect("utf-8", false, ',', '.'), Profile.Dialect);
        Assert.Equal([new("Adelie", 152), new("Chinstrap", 68), new("Gentoo", 124)], Profile.Columns[0].Values);
        Assert.Equal(2700, Profile.Columns[5].Minimum);
        Assert.Equal(6300, Profile.Columns[5].Maximum);
        Assert.Empty(Profile.DirectIdentifiers);
    }

    [Fact]
    public void Complete_rows_are_the_333_of_the_published_data()
    {
        using var stream = File.OpenRead(Fixture.Path("penguins.csv"));

        var table = CsvTable.Read(stream, Profile.Dialect, [.. Profile.Columns.Select(c => new ColumnRequest(c.Name, c.Numeric, c.MissingCodes))], TestContext.Current.CancellationToken);

        Assert.Equal(333, Enumerable.Range(0, table.Rows).Count(row => !table.Columns.Any(c => c.IsMissing(row))));
    }
}
