using System.Globalization;

namespace ModelLab.Intake.Tests.Csv.Proposals;

public sealed class KindProposalTests
{
    [Theory]
    [InlineData("0,1,1,0", VariableKind.Binary, "")]
    [InlineData("yes,no,no,yes", VariableKind.Binary, "")]
    [InlineData("8,19,8,8", VariableKind.Binary, "two-values")]
    [InlineData("5,5,5", VariableKind.Continuous, "constant")]
    [InlineData("x,x,x", VariableKind.Categorical, "constant")]
    [InlineData(",NA,-", VariableKind.Categorical, "empty-column")]
    [InlineData("1.5,2.25,3,2.25", VariableKind.Continuous, "")]
    [InlineData("red,green,red,blue,green", VariableKind.Categorical, "")]
    [InlineData("A7,B2,C9,D4", VariableKind.Identifier, "identifier-perhaps")]
    [InlineData("1,2,3,4,5", VariableKind.Identifier, "identifier-perhaps")]
    [InlineData("1947,1948,1949,1950", VariableKind.Continuous, "sequence")]
    [InlineData("007,012,007,013", VariableKind.Categorical, "leading-zeros")]
    [InlineData("007,012,009,013", VariableKind.Identifier, "leading-zeros")]
    [InlineData("2024-01-31,2024-02-29,2023-12-01", VariableKind.Date, "")]
    [InlineData("2024-01-31T10:20:30Z,2024-02-29 11:00", VariableKind.Date, "")]
    [InlineData("2024-02-30,2024-02-28,2024-02-28,2024-02-30", VariableKind.Binary, "")]
    [InlineData("31/01/2024,28/02/2024,01/03/2024", VariableKind.Date, "date-order")]
    [InlineData("01/31/2024,02/28/2024,03/01/2024", VariableKind.Date, "date-order")]
    [InlineData("1.2.2024,3.4.2024,5.6.2024", VariableKind.Date, "date-ambiguous")]
    [InlineData("31/01/2024,01/31/2024,01/01/2024", VariableKind.Date, "date-mixed")]
    [InlineData("20240131,20240228,20240301", VariableKind.Date, "date-compact")]
    [InlineData("low,high,medium,low,high", VariableKind.Categorical, "ordered-perhaps")]
    [InlineData("Never,sometimes,often,often,never", VariableKind.Categorical, "ordered-perhaps|spelling-variants")]
    [InlineData("0-19,20-39,40+,0-19", VariableKind.Categorical, "ordered-perhaps")]
    [InlineData("1 - no,2 - some,3 - much,1 - no", VariableKind.Categorical, "ordered-perhaps")]
    [InlineData("Male,male,female,female,Male", VariableKind.Categorical, "spelling-variants")]
    [InlineData("a ,b,a,c,b", VariableKind.Categorical, "spaces-around|spelling-variants")]
    [InlineData("12 %,13 %,14 %,12 %", VariableKind.Categorical, "number-with-unit")]
    [InlineData("€5,€6,€7,€7", VariableKind.Categorical, "number-with-unit")]
    [InlineData("1.5,2.5,<3,4.5,1.5", VariableKind.Categorical, "numbers-with-texts")]
    [InlineData("1.5,2.5,Inf,4.5,1.5", VariableKind.Categorical, "missing-code-suspected|numbers-with-texts")]
    public void The_kind_and_its_questions(string cells, VariableKind kind, string questions)
    {
        var column = Fixture.Column("x", cells.Split(',').Select(c => c));

        Assert.Equal(kind, column.ProposedKind);
        Assert.Equal(questions, string.Join('|', Fixture.Codes(column)));
    }

    [Theory]
    [InlineData("dwelling_id", "30,10,20,50", VariableKind.Identifier, "identifier-perhaps")]
    [InlineData("siteId", "3,3,7,7,9,9", VariableKind.Identifier, "repeated-identifier")]
    [InlineData("day", "1,2,3,4", VariableKind.Continuous, "sequence")]
    [InlineData("idea", "30,10,20,50", VariableKind.Continuous, "")]
    public void Words_of_the_name_weigh(string name, string cells, VariableKind kind, string questions)
    {
        var column = Fixture.Column(name, cells.Split(','));

        Assert.Equal(kind, column.ProposedKind);
        Assert.Equal(questions, string.Join('|', Fixture.Codes(column)));
    }

    [Fact]
    public void Many_repeated_texts_are_questioned()
    {
        var column = Fixture.Column("place", Enumerable.Range(0, 300).Select(i => $"place {(char)('a' + (i % 3))} {i % 120}x"));

        Assert.Equal(VariableKind.Categorical, column.ProposedKind);
        Assert.Equal(["many-categories"], Fixture.Codes(column));
        Assert.Empty(column.Values);
        Assert.Equal(120, column.Distinct);
    }

    [Fact]
    public void Counting_of_distinct_values_stops_at_its_cap()
    {
        var column = Fixture.Column("x", Enumerable.Range(0, 10_001).Select(i => ((i * 7.5) + 0.25).ToString(CultureInfo.InvariantCulture)));
        var exact = Fixture.Column("x", Enumerable.Range(0, 20_000).Select(i => ((i % 10_000) + 0.25).ToString(CultureInfo.InvariantCulture)));

        Assert.True(column.DistinctCapped);
        Assert.Equal(10_000, column.Distinct);
        Assert.False(exact.DistinctCapped);
        Assert.Equal(10_000, exact.Distinct);
    }

    [Fact]
    public void A_hundred_values_are_listed_and_one_more_is_not()
    {
        Assert.Equal(100, Fixture.Column("x", Enumerable.Range(0, 300).Select(i => $"v{i % 100}")).Values.Count);
        Assert.Empty(Fixture.Column("x", Enumerable.Range(0, 303).Select(i => $"v{i % 101}")).Values);
    }
}
