using System.Globalization;
using ModelLab.Statistics.Distributions;

namespace ModelLab.Statistics.Tests.Distributions;

/// <summary>Quantiles against 20-digit values (source: Fixtures/distributions/README.md) and against the tails.</summary>
public class UpperQuantileTests(ITestOutputHelper output)
{
    [Theory]
    [InlineData("normal")]
    [InlineData("t")]
    [InlineData("chi2")]
    [InlineData("f")]
    public void Tabulated_quantiles_are_met_as_far_as_the_rounded_probability_allows(string distribution)
    {
        var worst = LogRelativeError.Most;
        var offenders = new List<string>();
        foreach (var row in FixtureLines.Read("distributions/quantiles.csv").Where(row => row[0] == distribution))
        {
            var upper = (double)(1 - decimal.Parse(row[3], CultureInfo.InvariantCulture));
            var expected = UpperTailTests.Parse(row[4]);
            var computed = Quantile(distribution, upper, row[1], row[2]);
            worst = Math.Min(worst, LogRelativeError.Of(computed, expected));

            // half a unit of the probability's last place moves the quantile by dp / density
            const double h = 1e-6;
            var scale = distribution is "t" ? 0.5 : 1;
            var slope = scale * (UpperTailTests.Tail(distribution, expected * (1 - h), row[1], row[2])
                - UpperTailTests.Tail(distribution, expected * (1 + h), row[1], row[2])) / (2 * h);
            var allowed = 4.5e-16 + (Math.BitIncrement(upper) - upper) / slope;
            if (Math.Abs(computed - expected) > allowed * expected)
            {
                offenders.Add($"{string.Join(',', row)}: {computed:R}");
            }
        }

        output.WriteLine($"{distribution}: fewest digits {worst:F2}");
        Assert.Empty(offenders);
        // chi-squared at upper tail 0.999 on 1 degree of freedom is the worst conditioned
        Assert.InRange(worst, distribution is "chi2" ? 13 : 15, 16);
    }

    [Theory]
    [InlineData(1e-300)]
    [InlineData(1e-100)]
    [InlineData(1e-10)]
    [InlineData(0.025)]
    [InlineData(0.4999)]
    [InlineData(0.75)]
    [InlineData(0.9999)]
    public void The_tail_at_the_quantile_is_the_probability_asked_for(double p)
    {
        foreach (var df in new[] { 0.7, 1, 3, 11.5, 250, 1e5, 1e7 })
        {
            Check(p, x => StudentT.UpperTail(x, df), StudentT.UpperQuantile(p, df), $"t({df})");
            Check(p, x => ChiSquared.UpperTail(x, df), ChiSquared.UpperQuantile(p, df), $"chi-squared({df})");
            foreach (var df1 in new[] { 0.9, 2, 30, 4000 })
            {
                Check(p, x => FisherF.UpperTail(x, df1, df), FisherF.UpperQuantile(p, df1, df), $"F({df1}, {df})");
            }
        }

        Check(p, Normal.UpperTail, Normal.UpperQuantile(p), "normal");
    }

    [Fact]
    public void Quantiles_are_symmetric_for_t_and_the_normal()
    {
        Assert.Equal(0, StudentT.UpperQuantile(0.5, 4));
        Assert.Equal(0, Normal.UpperQuantile(0.5));
        Assert.Equal(-StudentT.UpperQuantile(0.25, 4), StudentT.UpperQuantile(0.75, 4));
        Assert.Equal(-Normal.UpperQuantile(0.125), Normal.UpperQuantile(0.875));
        Assert.Equal(Normal.UpperQuantile(0.01), StudentT.UpperQuantile(0.01, double.PositiveInfinity));
    }

    [Fact]
    public void Quantiles_next_to_the_middle_keep_their_digits()
    {
        // t = (½ − p)/density(0) to first order; 1/π on 1 degree of freedom, 1/√(2π) for the normal
        const double away = 1.0 / (1L << 40);
        Assert.InRange(LogRelativeError.Of(StudentT.UpperQuantile(0.5 - away, 1), Math.PI * away), 15, 16);
        Assert.InRange(LogRelativeError.Of(Normal.UpperQuantile(0.5 - away), Math.Sqrt(2 * Math.PI) * away), 15, 16);
    }

    [Fact]
    public void A_quantile_beyond_the_largest_double_is_infinite()
    {
        // t on 0.01 degrees of freedom falls like t^-0.01: its tail at 1e308 is still above 1e-4
        Assert.Equal(double.PositiveInfinity, StudentT.UpperQuantile(1e-10, 0.01));
    }

    [Fact]
    public void A_quantile_among_the_smallest_doubles_is_met_and_one_below_them_is_0()
    {
        // χ² on few degrees of freedom heaps up at 0 like x^(df/2)
        Assert.InRange(ChiSquared.UpperQuantile(0.9999999999552448, 0.06421954057511428), double.Epsilon, 1e-320);
        Assert.Equal(0, ChiSquared.UpperQuantile(0.99, 0.001));
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(-0.1)]
    [InlineData(double.NaN)]
    public void Probabilities_outside_0_to_1_are_refused(double p)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => StudentT.UpperQuantile(p, 3));
        Assert.Throws<ArgumentOutOfRangeException>(() => FisherF.UpperQuantile(p, 3, 3));
        Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquared.UpperQuantile(p, 3));
        Assert.Throws<ArgumentOutOfRangeException>(() => Normal.UpperQuantile(p));
    }

    // The neighbours of a right quantile have tails on either side of p (or the same double).
    private static void Check(double p, Func<double, double> tail, double quantile, string name)
    {
        if (double.IsInfinity(quantile))
        {
            Assert.True(tail(double.MaxValue) > p, $"{name} at {p}");
            return;
        }

        var unit = Math.Max(Math.Abs(quantile) * 3e-16, double.Epsilon);
        var above = tail(quantile + unit);
        var below = tail(quantile - unit);
        const double rounding = 4e-16;
        Assert.True(above <= p * (1 + rounding) && below >= p * (1 - rounding), $"{name} at {p}: {quantile:R} has tails {below:R} to {above:R}");
    }

    private static double Quantile(string distribution, double upper, string df1, string df2) => distribution switch
    {
        "normal" => Normal.UpperQuantile(upper),
        "t" => StudentT.UpperQuantile(upper, UpperTailTests.Parse(df1)),
        "chi2" => ChiSquared.UpperQuantile(upper, UpperTailTests.Parse(df1)),
        "f" => FisherF.UpperQuantile(upper, UpperTailTests.Parse(df1), UpperTailTests.Parse(df2)),
        _ => throw new ArgumentException(distribution),
    };
}
