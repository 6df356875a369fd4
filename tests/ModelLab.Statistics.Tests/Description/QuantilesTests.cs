using ModelLab.Statistics.Description;
using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Description;

public class QuantilesTests
{
    [Theory]
    [InlineData(0, 15)]
    [InlineData(0.25, 20)]
    [InlineData(0.4, 29)]
    [InlineData(0.5, 35)]
    [InlineData(0.75, 40)]
    [InlineData(1, 50)]
    public void Definition_7_interpolates_between_neighbours(double p, double expected)
    {
        // by hand from h = (n − 1)p, n = 5: at 0.4 h = 1.6, so 20 + 0.6·15
        var column = new NumberColumn("x", [40, 15, double.NaN, 50, 20, 35]);
        Assert.Equal(expected, Quantiles.Of(column, p)!.Value, 1e-14);
    }

    [Fact]
    public void Decimals_as_written_are_averaged_as_written()
    {
        // 0.1 and 0.2: halfway 0.15, whose nearest double is not (0.1 + 0.2)/2 in doubles
        Assert.Equal(0.15, Quantiles.Of(FixtureTable.Numbers("x", ["0.1", "0.2"]), 0.5));
        Assert.NotEqual(0.15, (0.1 + 0.2) / 2);
    }

    [Fact]
    public void A_column_without_values_has_none() => Assert.Null(Quantiles.Of(new NumberColumn("x", [double.NaN]), 0.5));

    [Theory]
    [InlineData(-0.1)]
    [InlineData(1.5)]
    [InlineData(double.NaN)]
    public void A_share_outside_0_to_1_is_refused(double p) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => Quantiles.Of(new NumberColumn("x", [1]), p));
}
