using System.Globalization;

namespace ModelLab.Intake.Tests.Csv.Proposals;

public sealed class MissingCodeSuspicionTests
{
    [Theory]
    [InlineData("12.5,13,-99,14.5", "'-99'")]
    [InlineData("12.5,13,-9,14.5", "'-9'")]
    [InlineData("12.5,13,-1,14.5", "'-1'")]
    [InlineData("18.5,80,44,999", "'999'")]
    [InlineData("18.5,80,44,99", "'99'")]
    [InlineData("1,2,3,4,5,9,1,2,3,4,5,9", "'9'")]
    [InlineData("1.5,-99,2.5,-98,3", "'-99' or '-98'")]
    [InlineData("12.5,13,-99.0,14.5", "'-99'")]
    [InlineData("red,unknown,blue,red,blue,unknown,green", "'unknown'")]
    [InlineData("1.5,#N/A,2.5,3.5", "'#N/A'")]
    public void Values_apart_and_telling_words_are_questioned(string cells, string named)
    {
        var question = Fixture.Column("x", cells.Split(',')).Questions.Single(q => q.Code == "missing-code-suspected");

        Assert.Contains(named, question.Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("-120.5,13,-99,14.5")]
    [InlineData("90.5,97,99,101.5")]
    [InlineData("-1,0,1,-1,0,1,0")]
    [InlineData("-3.5,-2,-1,0.5")]
    [InlineData("2,3,4,5,6,7,8,9,2,3,4,5,6,7,8,9")]
    [InlineData("99,98")]
    public void Values_among_others_are_not(string cells) =>
        Assert.DoesNotContain("missing-code-suspected", Fixture.Codes(Fixture.Column("x", cells.Split(','))));

    [Fact]
    public void A_suspected_code_is_read_as_a_value_until_it_is_named()
    {
        var column = Fixture.Column("x", ["12.5", "13", "-99", "14.5"]);

        Assert.Equal(0, column.Missing);
        Assert.Equal(-99, column.Minimum);
    }

    [Theory]
    [InlineData("")]
    [InlineData("  ")]
    [InlineData("NA")]
    [InlineData("N/A")]
    [InlineData("na")]
    [InlineData("n/a")]
    [InlineData("NaN")]
    [InlineData("null")]
    [InlineData("NULL")]
    [InlineData(".")]
    [InlineData("-")]
    [InlineData("?")]
    [InlineData(" NA ")]
    public void Usual_texts_are_taken_as_missing_and_told(string text)
    {
        var column = Fixture.Column("x", ["1.5", text, "2.5", text]);

        Assert.Equal(2, column.Missing);
        Assert.Equal([text.Trim()], column.MissingCodes);
        Assert.True(column.Numeric);
        Assert.Equal(2, column.Distinct);
    }

    [Fact]
    public void All_texts_taken_are_told_in_ordinal_order() =>
        Assert.Equal(["", ".", "?", "NA", "null"], Fixture.Column("x", ["null", "1", "NA", "", "2", "?", ".", "NA"]).MissingCodes);

    [Theory]
    [InlineData("Inf")]
    [InlineData("-Infinity")]
    [InlineData("1e999")]
    [InlineData("0x1F")]
    [InlineData("1_000")]
    [InlineData("١٢")]
    [InlineData("−5")]
    [InlineData("1e")]
    [InlineData("+-1")]
    [InlineData("1.2.3")]
    [InlineData("(5)")]
    public void What_is_no_number_makes_no_number(string text)
    {
        var column = Fixture.Column("x", ["1.5", text, "2.5", "1.5"]);

        Assert.False(column.Numeric);
        Assert.Null(column.Minimum);
        Assert.Contains("numbers-with-texts", Fixture.Codes(column));
        Assert.Contains("row 2", column.Questions.Single(q => q.Code == "numbers-with-texts").Message, StringComparison.Ordinal);
        Assert.Equal(4L.ToString(CultureInfo.InvariantCulture), column.Values.Sum(v => v.Count).ToString(CultureInfo.InvariantCulture));
    }
}
