using ModelLab.Statistics.Collinearity;
using ModelLab.Statistics.Description;

namespace ModelLab.Statistics.Tests.Collinearity;

public class TiedPredictorsTests
{
    [Fact]
    public void Chains_become_one_set_and_order_follows_the_columns()
    {
        // e–b and b–d tie e, b, d though e–d is weak; a–c ties a, c
        var sets = TiedPredictors.Find(
        [
            Pair("a", "b", 0.1), Pair("a", "c", -0.75), Pair("a", "d", 0.2), Pair("a", "e", null),
            Pair("b", "c", 0.3), Pair("b", "d", 0.71), Pair("b", "e", -0.99),
            Pair("c", "d", 0.69), Pair("c", "e", 0), Pair("d", "e", -0.5),
        ]);
        Assert.Equal(2, sets.Count);
        Assert.Equal(["a", "c"], sets[0].Variables);
        Assert.Equal(["b", "d", "e"], sets[1].Variables);
        Assert.Equal([-0.99, 0.71], sets[1].Pairs.Select(pair => pair.R!.Value));
    }

    [Fact]
    public void The_threshold_itself_ties_and_0_7_is_it()
    {
        Assert.Single(TiedPredictors.Find([Pair("a", "b", -0.7)]));
        Assert.Empty(TiedPredictors.Find([Pair("a", "b", 0.6999999999999999)]));
        Assert.Single(TiedPredictors.Find([Pair("a", "b", 0.5)], 0.5));
    }

    [Fact]
    public void Equal_correlations_keep_the_order_of_the_columns()
    {
        var set = Assert.Single(TiedPredictors.Find([Pair("x", "y", 0.8), Pair("x", "z", -0.8), Pair("y", "z", 0.9)]));
        Assert.Equal([("y", "z"), ("x", "y"), ("x", "z")], set.Pairs.Select(pair => (pair.First, pair.Second)));
    }

    [Fact]
    public void Nothing_tied_gives_no_sets() => Assert.Empty(TiedPredictors.Find([]));

    [Theory]
    [InlineData(0)]
    [InlineData(1.01)]
    [InlineData(double.NaN)]
    public void A_threshold_outside_0_to_1_is_refused(double threshold) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => TiedPredictors.Find([], threshold));

    private static Correlation Pair(string first, string second, double? r) => new(first, second, 50, r, null, null, null);
}
