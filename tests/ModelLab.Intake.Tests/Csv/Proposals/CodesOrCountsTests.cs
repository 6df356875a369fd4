using System.Globalization;

namespace ModelLab.Intake.Tests.Csv.Proposals;

public sealed class CodesOrCountsTests
{
    [Theory]
    [InlineData("tenure_code", 1, 4, VariableKind.Categorical)]
    [InlineData("answer", 1, 5, VariableKind.Categorical)]
    [InlineData("answer", 0, 3, VariableKind.Categorical)]
    [InlineData("rooms", 2, 9, VariableKind.Continuous)]
    [InlineData("occupants", 1, 7, VariableKind.Continuous)]
    [InlineData("score", 0, 4, VariableKind.Continuous)]
    [InlineData("x", 2, 9, VariableKind.Continuous)]
    [InlineData("plotType", 3, 6, VariableKind.Categorical)]
    public void Few_whole_numbers_are_questioned_and_the_name_weighs(string name, int from, int to, VariableKind proposal)
    {
        var column = Fixture.Column(name, Cycle(from, to, 60));

        Assert.Equal(proposal, column.ProposedKind);
        Assert.True(column.Numeric);
        Assert.Equal(["codes-or-counts"], Fixture.Codes(column));
    }

    [Fact]
    public void Codes_with_a_gap_are_no_plain_run_and_stay_numbers_until_said() =>
        Assert.Equal(VariableKind.Continuous, Fixture.Column("answer", Repeat(20, "1", "2", "4")).ProposedKind);

    [Fact]
    public void Codes_written_with_a_decimal_zero_are_questioned_too() =>
        Assert.Equal(["codes-or-counts"], Fixture.Codes(Fixture.Column("answer", Repeat(20, "1.0", "2.0", "3.0"))));

    [Theory]
    [InlineData("answer", "99", VariableKind.Categorical)]
    [InlineData("answer", "-9", VariableKind.Categorical)]
    [InlineData("rooms", "99", VariableKind.Continuous)]
    public void A_suspected_missing_code_does_not_hide_the_codes(string name, string suspect, VariableKind proposal)
    {
        var column = Fixture.Column(name, Repeat(8, "1", "2", "3", "4", "5", suspect));

        Assert.Equal(proposal, column.ProposedKind);
        Assert.Equal(["codes-or-counts", "missing-code-suspected"], Fixture.Codes(column));
        Assert.StartsWith($"Besides {suspect} the column holds only 5 different whole numbers.", column.Questions[0].Message, StringComparison.Ordinal);
    }

    [Fact]
    public void A_suspected_missing_code_makes_no_codes_of_a_measure() =>
        Assert.Equal(["missing-code-suspected"], Fixture.Codes(Fixture.Column("income", Repeat(8, "1200", "1350", "1800", "2100", "-99"))));

    [Theory]
    [InlineData(1, 11)]
    [InlineData(-2, 2)]
    public void Many_values_or_negative_ones_are_measures(int from, int to)
    {
        var column = Fixture.Column("x", Cycle(from, to, 60));

        Assert.Equal(VariableKind.Continuous, column.ProposedKind);
        Assert.Empty(column.Questions);
    }

    [Fact]
    public void A_wide_range_is_a_measure() => Assert.Empty(Fixture.Column("x", Repeat(20, "50", "60", "71")).Questions);

    [Fact]
    public void Halves_are_a_measure() => Assert.Empty(Fixture.Column("x", Repeat(20, "0.5", "1", "1.5", "2")).Questions);

    [Fact]
    public void Values_that_hardly_repeat_are_a_measure() => Assert.Empty(Fixture.Column("x", ["3", "1", "4", "1", "5", "9", "2", "6"]).Questions);

    private static IEnumerable<string> Cycle(int from, int to, int rows) =>
        Enumerable.Range(0, rows).Select(i => (from + ((i * 13) % (to - from + 1))).ToString(CultureInfo.InvariantCulture));

    private static IEnumerable<string> Repeat(int times, params string[] cells) => Enumerable.Repeat(cells, times).SelectMany(c => c);
}
