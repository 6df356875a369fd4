using ModelLab.Statistics.Description;
using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Description;

public class CorrelationsTests(ITestOutputHelper output)
{
    [Theory]
    [InlineData("pearson")]
    [InlineData("spearman")]
    public void Penguins_and_Longley_agree_with_mpmath_and_scipy(string kind)
    {
        // source: Fixtures/description/README.md
        var worst = LogRelativeError.Most;
        var expected = FixtureLines.Read("description/correlations.csv").Where(row => row[0] == kind).ToList();
        Assert.Equal(27, expected.Count);
        foreach (var table in expected.GroupBy(row => row[1]))
        {
            var data = FixtureTable.Read($"worked/{table.Key}", "species", "island", "sex");
            var columns = table.SelectMany(row => new[] { row[2], row[3] }).Distinct().Select(name => (NumberColumn)data.Find(name)!).ToList();
            var computed = kind == "pearson" ? Correlations.Pearson(columns, [], 0.95) : Correlations.Spearman(columns, [], 0.95);
            Assert.Equal(table.Select(row => (row[2], row[3])), computed.Select(c => (c.First, c.Second)));
            foreach (var (row, correlation) in table.Zip(computed))
            {
                Assert.Equal(int.Parse(row[4]), correlation.N);
                double?[] figures = [correlation.R, correlation.Lower, correlation.Upper, correlation.P];
                for (var i = 0; i < figures.Length; i++)
                {
                    Assert.Equal(row[5 + i].Length > 0, figures[i].HasValue);
                    if (figures[i] is not { } figure)
                    {
                        continue;
                    }

                    var digits = LogRelativeError.Of(figure, row[5 + i]);
                    worst = Math.Min(worst, digits);
                    Assert.True(digits >= 14, $"{row[2]} with {row[3]}, figure {i}: {figure:R} against {row[5 + i]}");
                }
            }
        }

        output.WriteLine($"{kind}: fewest digits {worst:F2}");
    }

    [Fact]
    public void Each_pair_uses_the_rows_present_in_both_among_those_chosen()
    {
        var a = new NumberColumn("a", [1, 2, 3, 4, double.NaN, 9]);
        var b = new NumberColumn("b", [2, double.NaN, 1, 5, 7, 100]);
        var c = new NumberColumn("c", [1, 5, 2, 2, 2, 50]);
        var computed = Correlations.Pearson([a, b, c], [0, 1, 2, 3, 4], 0.95);
        Assert.Equal([("a", "b", 3), ("a", "c", 4), ("b", "c", 4)], computed.Select(r => (r.First, r.Second, r.N)));

        // the same three rows alone
        var alone = Correlations.Pearson([new NumberColumn("a", [1, 3, 4]), new NumberColumn("b", [2, 1, 5])], [], 0.95)[0];
        Assert.Equal(alone, computed[0]);
        // a: −5/3, 1/3, 4/3; b: −2/3, −5/3, 7/3; r = (33/9)/√(42/9 · 78/9)
        Assert.Equal(33 / Math.Sqrt(42.0 * 78), computed[0].R!.Value, 1e-15);
    }

    [Fact]
    public void Decimals_as_written_that_lie_on_a_line_correlate_exactly()
    {
        var x = FixtureTable.Numbers("x", ["10000000.1", "10000000.2", "10000000.3", "10000000.7"]);
        var y = FixtureTable.Numbers("y", ["-0.3", "-0.6", "-0.9", "-2.1"]);
        Assert.Equal(new Correlation("x", "y", 4, -1, null, null, null), Correlations.Pearson([x, y], [], 0.95)[0]);
    }

    [Fact]
    public void What_too_few_rows_or_no_spread_leave_undefined_is_absent()
    {
        var constant = new NumberColumn("c", [2, 2, 2, 2]);
        var x = new NumberColumn("x", [1, 2, 4, 4]);
        Assert.Equal(new Correlation("c", "x", 4, null, null, null, null), Correlations.Pearson([constant, x], [], 0.95)[0]);
        Assert.Equal(new Correlation("c", "x", 1, null, null, null, null), Correlations.Pearson([constant, x], [2], 0.95)[0]);
        var three = Correlations.Pearson([x, new NumberColumn("y", [1, 5, 2, 0])], [0, 1, 2], 0.95)[0];
        Assert.NotNull(three.P);
        Assert.Null(three.Lower);
    }

    [Fact]
    public void Uncorrelated_values_have_p_1_and_an_interval_around_0()
    {
        var computed = Correlations.Pearson([new NumberColumn("x", [-1, 0, 0, 1]), new NumberColumn("y", [0, 1, -1, 0])], [], 0.9)[0];
        Assert.Equal(0, computed.R);
        Assert.Equal(1, computed.P);
        Assert.Equal(-computed.Upper, computed.Lower);
    }

    [Fact]
    public void Rank_correlation_ignores_any_rising_transform()
    {
        double[] x = [0.3, 1, 2.5, 2.5, 4, 7];
        double[] y = [3, 1, 2, 5, 4, 9];
        var plain = Correlations.Spearman([new NumberColumn("x", x), new NumberColumn("y", y)], [], 0.95)[0];
        var bent = Correlations.Spearman([new NumberColumn("x", [.. x.Select(Math.Exp)]), new NumberColumn("y", y)], [], 0.95)[0];
        Assert.Equal(plain, bent);
    }

    [Fact]
    public void Columns_of_different_length_and_levels_outside_0_to_1_are_refused()
    {
        Assert.Throws<ArgumentException>(() => Correlations.Pearson([new NumberColumn("x", [1, 2]), new NumberColumn("y", [1])], [], 0.95));
        Assert.Throws<ArgumentOutOfRangeException>(() => Correlations.Pearson([], [], 95));
    }
}
