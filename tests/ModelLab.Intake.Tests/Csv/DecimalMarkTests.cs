using ModelLab.Intake.Csv;

namespace ModelLab.Intake.Tests.Csv;

public sealed class DecimalMarkTests
{
    [Fact]
    public void The_mark_is_decided_by_all_rows_however_late_the_first_one_stands()
    {
        var profile = Fixture.Profile("a;b\n" + string.Concat(Enumerable.Repeat("1;2\n", 400_000)) + "1,5;3\n");

        Assert.Equal(',', profile.Dialect.DecimalMark);
        Assert.Equal(1.5, profile.Columns[0].Maximum);
        Assert.False(profile.Columns[0].Whole);
        Assert.True(profile.Columns[1].Whole);
    }

    [Fact]
    public void Columns_of_the_mark_that_fewer_use_are_texts_and_questioned_with_their_place()
    {
        var profile = Fixture.Profile("a;b;c\n1,5;7;2.5\n2,5;8,25;1\n3;9;2.75\n");

        Assert.Equal(',', profile.Dialect.DecimalMark);
        Assert.False(profile.Columns[2].Numeric);
        var question = profile.Columns[2].Questions.Single(q => q.Code == "decimal-mark-mixed");
        Assert.Contains("row 1", question.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Commas_in_lists_of_answers_do_not_outvote_points()
    {
        var profile = Fixture.Profile("answers,x\n\"1,3\",2.5\n\"2,4\",3.5\n\"1,2,4\",4.5\n");

        Assert.Equal('.', profile.Dialect.DecimalMark);
        Assert.False(profile.Columns[0].Numeric);
        Assert.True(profile.Columns[1].Numeric);
    }

    [Theory]
    [InlineData("a;b\n1,234;x\n5,678;y\n")]
    [InlineData("a;b\n1.234;x\n5.678;y\n")]
    public void Marks_that_all_stand_before_three_digits_are_questioned(string text) =>
        Assert.Contains("thousands-or-decimals", Fixture.Codes(Fixture.Profile(text).Columns[0]));

    [Theory]
    [InlineData("a;b\n1,234;x\n0,678;y\n")]
    [InlineData("a;b\n1,234;x\n5,67;y\n")]
    [InlineData("a,b\n1.234,x\n5.678,y\n")]
    public void Marks_that_cannot_or_need_not_be_thousands_are_not(string text) =>
        Assert.DoesNotContain("thousands-or-decimals", Fixture.Codes(Fixture.Profile(text).Columns[0]));

    [Fact]
    public void A_stated_mark_settles_the_question()
    {
        var column = Fixture.Profile("a;b\n1,234;x\n5,678;y\n", new CsvOptions(DecimalMark: ',')).Columns[0];

        Assert.Equal(1.234, column.Minimum);
        Assert.DoesNotContain("thousands-or-decimals", Fixture.Codes(column));
    }

    [Fact]
    public void Two_columns_with_thousands_marks_are_told_together()
    {
        var refused = Fixture.Refused(Fixture.Utf8("a;b;c\n1.234,5;1 000;2\n7;12;3\n"));

        Assert.Equal(["a", "b"], refused.Problems.Select(p => p.Column));
    }
}
