using ModelLab.Web.Features.Demo.Data;
using Xunit;

namespace ModelLab.Web.Tests.Features.Demo;

// Each sample mean is compared with the expectation by five of its standard errors; the textbook moments stand beside it.
public sealed class VariatesTests
{
    private const int Draws = 100_000;

    private readonly Variates draw = new(new Xoshiro256StarStar(2024));

    [Fact]
    public void Normal_variates_have_mean_0_variance_1_and_the_fourth_moment_3()
    {
        var sample = Sample(draw.Normal);
        Near(0, 1, sample);
        Near(1, Math.Sqrt(2), sample.Select(x => x * x));
        Near(3, Math.Sqrt(96), sample.Select(x => x * x * x * x));
    }

    [Fact]
    public void Normal_variates_lie_beyond_1_96_in_one_of_twenty() =>
        Near(0.05, Math.Sqrt(0.05 * 0.95), Sample(draw.Normal).Select(x => Math.Abs(x) > 1.959964 ? 1.0 : 0.0));

    [Fact]
    public void Gamma_variates_have_mean_shape_times_scale() => Near(4 * 14, 2 * 14, Sample(() => draw.Gamma(4, 14)));

    [Fact]
    public void Binomial_variates_have_mean_trials_times_probability() => Near(6 * 0.24, Math.Sqrt(6 * 0.24 * 0.76), Sample(() => draw.Binomial(6, 0.24)));

    [Fact]
    public void A_pick_meets_each_index_as_often_as_it_should()
    {
        double[] shares = [0.34, 0.30, 0.22, 0.14];
        var sample = Sample(() => draw.Pick(shares));
        for (var i = 0; i < shares.Length; i++)
        {
            Near(shares[i], Math.Sqrt(shares[i] * (1 - shares[i])), sample.Select(x => x == i ? 1.0 : 0.0));
        }
    }

    [Fact]
    public void Log_normal_variates_keep_their_ends_and_their_median()
    {
        var sample = Sample(() => draw.LogNormal(88, 0.30, 38, 210));
        Assert.All(sample, x => Assert.InRange(x, 38, 210));
        Near(0.5, 0.5, sample.Select(x => x > 88 ? 1.0 : 0.0));
    }

    [Theory]
    [InlineData(0.25, 2, 0.5)]
    [InlineData(-0.25, 2, -0.5)]
    [InlineData(-0.2, 2, 0)]
    [InlineData(12.344, 100, 12.34)]
    public void Rounding_takes_halves_away_from_zero_and_knows_no_negative_zero(double value, double parts, double expected)
    {
        var rounded = Variates.Round(value, parts);
        Assert.Equal(expected, rounded);
        Assert.False(double.IsNegative(rounded) && rounded == 0);
    }

    private static List<double> Sample(Func<double> next) => [.. Enumerable.Range(0, Draws).Select(_ => next())];

    private static void Near(double expectation, double deviation, IEnumerable<double> sample) =>
        Assert.InRange(sample.Average(), expectation - (5 * deviation / Math.Sqrt(Draws)), expectation + (5 * deviation / Math.Sqrt(Draws)));
}
