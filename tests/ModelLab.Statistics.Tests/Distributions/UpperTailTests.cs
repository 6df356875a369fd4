using System.Globalization;
using ModelLab.Statistics.Distributions;
using Library = MathNet.Numerics.Distributions;

namespace ModelLab.Statistics.Tests.Distributions;

/// <summary>Tails against 25-digit values (how they were made: Fixtures/distributions/README.md).</summary>
public class UpperTailTests(ITestOutputHelper output)
{
    private const double Goal = 15;

    [Theory]
    [InlineData("normal", 20)]
    [InlineData("t", 130)]
    [InlineData("chi2", 100)]
    [InlineData("f", 220)]
    public void Every_tail_from_nearly_1_to_1e_300_has_15_digits(string distribution, int atLeast)
    {
        var rows = FixtureLines.Read("distributions/tails.csv").Where(row => row[0] == distribution).ToList();
        Assert.True(rows.Count >= atLeast, $"only {rows.Count} rows of {distribution}");
        Assert.Contains(rows, row => Parse(row[4]) < 1e-290);

        var worst = LogRelativeError.Most;
        var offenders = new List<string>();
        foreach (var row in rows)
        {
            var tail = Tail(distribution, Parse(row[1]), row[2], row[3]);
            var digits = LogRelativeError.Of(tail, row[4]);
            worst = Math.Min(worst, digits);
            if (digits < Goal)
            {
                offenders.Add($"{string.Join(',', row)}: {tail:R}, {digits:F2} digits");
            }
        }

        output.WriteLine($"{distribution}: {rows.Count} tails, fewest digits {worst:F2}");
        Assert.Empty(offenders);
    }

    [Theory]
    [InlineData("normal")]
    [InlineData("t")]
    [InlineData("chi2")]
    [InlineData("f")]
    public void The_tail_at_a_tabulated_quantile_is_the_tabulated_probability(string distribution)
    {
        var worst = LogRelativeError.Most;
        foreach (var row in FixtureLines.Read("distributions/quantiles.csv").Where(row => row[0] == distribution))
        {
            var tail = Tail(distribution, Parse(row[4]), row[1], row[2]);
            var expected = (double)(1 - decimal.Parse(row[3], CultureInfo.InvariantCulture));
            var digits = LogRelativeError.Of(distribution is "t" ? tail / 2 : tail, expected);
            worst = Math.Min(worst, digits);
            // The quantile is rounded to double; the tail changes by up to 30 times that relative rounding.
            Assert.True(digits >= 14, $"{string.Join(',', row)}: {digits:F2} digits");
        }

        output.WriteLine($"{distribution}: fewest digits {worst:F2}");
        Assert.InRange(worst, 14, 16);
    }

    [Theory]
    [InlineData(0.7, 3.5, 12)]
    [InlineData(2.5, 4, 40)]
    [InlineData(9, 1, 7.5)]
    public void Tails_agree_with_an_independent_library_to_its_accuracy(double f, double df1, double df2)
    {
        // MathNet.Numerics 5: its incomplete beta and gamma functions reach about 12 digits
        Assert.Equal(1 - Library.FisherSnedecor.CDF(df1, df2, f), FisherF.UpperTail(f, df1, df2), 1e-11);
        Assert.Equal(1 - Library.ChiSquared.CDF(df1, f), ChiSquared.UpperTail(f, df1), 1e-11);
        Assert.Equal(1 - Library.StudentT.CDF(0, 1, df2, f), StudentT.UpperTail(f, df2), 1e-11);
        Assert.Equal(1 - Library.Normal.CDF(0, 1, f), Normal.UpperTail(f), 1e-11);
    }

    [Fact]
    public void Tails_with_a_closed_form_follow_it()
    {
        // t on 1 degree of freedom: (2/π) arctan(1/t); on 2: 1 − t/√(t² + 2). F on (2, m): (1 + 2f/m)^(−m/2). χ² on 2: e^(−x/2).
        Assert.Equal(15, LogRelativeError.Of(StudentT.TwoSided(1e200, 1), 2 / (Math.PI * 1e200)), 1.0);
        Assert.Equal(15, LogRelativeError.Of(StudentT.TwoSided(3, 1), 2 / Math.PI * Math.Atan(1.0 / 3)), 1.0);
        Assert.Equal(15, LogRelativeError.Of(StudentT.TwoSided(1, 2), 1 - (1 / Math.Sqrt(3))), 1.0);
        Assert.Equal(15, LogRelativeError.Of(FisherF.UpperTail(3, 2, 2), 0.25), 1.0);
        Assert.Equal(15, LogRelativeError.Of(FisherF.UpperTail(1e300, 2, 2), 1e-300), 1.0);
        Assert.Equal(15, LogRelativeError.Of(ChiSquared.UpperTail(2, 2), Math.Exp(-1)), 1.0);
    }

    [Fact]
    public void Negative_arguments_mirror_t_and_the_normal()
    {
        Assert.Equal(StudentT.TwoSided(2.25, 7), StudentT.TwoSided(-2.25, 7));
        Assert.Equal(1, StudentT.UpperTail(-2.25, 7) + StudentT.UpperTail(2.25, 7), 1e-15);
        Assert.Equal(1, Normal.UpperTail(-1.5) + Normal.UpperTail(1.5), 1e-15);
        Assert.Equal(0.5, Normal.UpperTail(0));
        Assert.Equal(0.5, StudentT.UpperTail(0, 3));
    }

    [Fact]
    public void Arguments_at_the_ends_give_0_or_1()
    {
        Assert.Equal(1, FisherF.UpperTail(0, 3, 5));
        Assert.Equal(1, FisherF.UpperTail(-1, 3, 5));
        Assert.Equal(0, FisherF.UpperTail(double.PositiveInfinity, 3, 5));
        Assert.Equal(1, ChiSquared.UpperTail(0, 3));
        Assert.Equal(0, ChiSquared.UpperTail(double.PositiveInfinity, 3));
        Assert.Equal(0, StudentT.TwoSided(double.NegativeInfinity, 3));
        Assert.Equal(1, StudentT.UpperTail(double.NegativeInfinity, 3));
        Assert.Equal(1, StudentT.TwoSided(0, 3));
        Assert.Equal(0, Normal.UpperTail(double.PositiveInfinity));
    }

    [Fact]
    public void A_tail_below_the_smallest_double_is_0_and_just_above_it_is_not()
    {
        Assert.Equal(0, Normal.UpperTail(38.6));
        Assert.InRange(Normal.UpperTail(38.4), double.Epsilon, 1e-321);
        Assert.Equal(0, FisherF.UpperTail(1e10, 4, 1000));
        Assert.Equal(0, ChiSquared.UpperTail(1e300, 3));
        Assert.Equal(0, StudentT.TwoSided(1e300, 50));
    }

    [Fact]
    public void Infinite_degrees_of_freedom_are_the_limits_by_name()
    {
        Assert.Equal(2 * Normal.UpperTail(1.7), StudentT.TwoSided(1.7, double.PositiveInfinity));
        Assert.Equal(ChiSquared.UpperTail(12, 4), FisherF.UpperTail(3, 4, double.PositiveInfinity), 1e-16);
        // and 1e12 is next to it
        Assert.Equal(ChiSquared.UpperTail(12, 4), FisherF.UpperTail(3, 4, 1e12), 1e-12);
    }

    [Fact]
    public void Arguments_outside_the_domain_are_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => StudentT.TwoSided(double.NaN, 3));
        Assert.Throws<ArgumentOutOfRangeException>(() => StudentT.TwoSided(1, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => FisherF.UpperTail(1, -1, 3));
        Assert.Throws<ArgumentOutOfRangeException>(() => FisherF.UpperTail(1, double.PositiveInfinity, 3));
        Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquared.UpperTail(1, double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => Normal.UpperTail(double.NaN));
    }

    internal static double Tail(string distribution, double argument, string df1, string df2) => distribution switch
    {
        "normal" => Normal.UpperTail(argument),
        "t" => StudentT.TwoSided(argument, Parse(df1)),
        "chi2" => ChiSquared.UpperTail(argument, Parse(df1)),
        "f" => FisherF.UpperTail(argument, Parse(df1), Parse(df2)),
        _ => throw new ArgumentException(distribution),
    };

    internal static double Parse(string text) => double.Parse(text, CultureInfo.InvariantCulture);
}
