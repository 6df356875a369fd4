using ModelLab.Statistics.Description;
using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Description;

/// <summary>
/// The nine univariate sets of the NIST/ITL Statistical Reference Datasets. Their certified values have 15 digits; the
/// recomputed ones (exact rational arithmetic) show what lies beyond.
/// </summary>
public class NistUnivariateTests(ITestOutputHelper output)
{
    private const double Goal = 14;

    [Theory]
    [InlineData("Lew", 200)]
    [InlineData("Lottery", 218)]
    [InlineData("Mavro", 50)]
    [InlineData("Michelso", 100)]
    [InlineData("NumAcc1", 3)]
    [InlineData("NumAcc2", 1001)]
    [InlineData("NumAcc3", 1001)]
    [InlineData("NumAcc4", 1001)]
    [InlineData("PiDigits", 5000)]
    public void Mean_standard_deviation_and_autocorrelation_have_14_digits(string set, int n)
    {
        var column = (NumberColumn)FixtureTable.Read($"nist/univariate/{set}.csv").Columns[0];
        Assert.Equal(n, column.Rows);
        var computed = new Dictionary<string, double?>
        {
            ["mean"] = Mean.Of(column),
            ["standardDeviation"] = StandardDeviation.Of(column),
            ["autocorrelationLag1"] = Autocorrelation.Lag1(column),
        };

        var figures = FixtureLines.Read($"nist/univariate/{set}.figures.csv");
        Assert.Equal(computed.Count, figures.Count);
        foreach (var figure in figures)
        {
            var certified = LogRelativeError.Of(computed[figure[0]]!.Value, figure[1]);
            var exact = LogRelativeError.Of(computed[figure[0]]!.Value, figure[2]);
            output.WriteLine($"{set} {figure[0]}: {certified:F1} digits of the certified, {exact:F1} of the recomputed value");
            Assert.True(certified >= Goal, $"{figure[0]}: {certified:F2} digits of the certified value");
            Assert.True(exact >= 15.5, $"{figure[0]}: {exact:F2} digits of the recomputed value");
        }

        var description = Descriptives.Describe(column);
        Assert.Equal(computed["mean"], description.Mean);
        Assert.Equal(computed["standardDeviation"], description.StandardDeviation);
    }
}
