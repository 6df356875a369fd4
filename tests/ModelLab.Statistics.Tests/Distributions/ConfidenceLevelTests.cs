using ModelLab.Statistics.Distributions;

namespace ModelLab.Statistics.Tests.Distributions;

public class ConfidenceLevelTests
{
    [Theory]
    [InlineData(0.95, 0.025)]
    [InlineData(0.9, 0.05)]
    [InlineData(0.99, 0.005)]
    [InlineData(0.999, 0.0005)]
    public void The_tail_is_that_of_the_decimal(double level, double tail) => Assert.Equal(tail, ConfidenceLevel.UpperTail(level));

    [Fact]
    public void Doubles_alone_would_miss_it() => Assert.NotEqual(0.025, (1 - 0.95) / 2);

    [Fact]
    public void A_level_next_to_1_still_has_a_tail() => Assert.InRange(ConfidenceLevel.UpperTail(Math.BitDecrement(1.0)), 1e-17, 1e-16);

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(95)]
    [InlineData(double.NaN)]
    public void A_level_outside_0_to_1_is_refused(double level) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => ConfidenceLevel.UpperTail(level));
}
