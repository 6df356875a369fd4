using ModelLab.Statistics.Description;
using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Description;

public class DescriptivesTests(ITestOutputHelper output)
{
    [Fact]
    public void Penguins_and_Longley_agree_with_mpmath_numpy_and_scipy()
    {
        // source: Fixtures/description/README.md
        var worst = LogRelativeError.Most;
        var rows = FixtureLines.Read("description/numbers.csv");
        Assert.Equal(11, rows.Count);
        foreach (var row in rows)
        {
            var column = (NumberColumn)FixtureTable.Read($"worked/{row[0]}", "species", "island", "sex").Find(row[1])!;
            var description = Descriptives.Describe(column);
            Assert.Equal(int.Parse(row[2]), description.N);
            Assert.Equal(int.Parse(row[3]), description.Missing);
            Assert.Equal(int.Parse(row[4]), description.Distinct);
            double?[] figures =
            [
                description.Mean, description.StandardDeviation, description.Minimum, description.LowerQuartile, description.Median,
                description.UpperQuartile, description.Maximum, description.Skewness, description.ExcessKurtosis,
            ];
            for (var i = 0; i < figures.Length; i++)
            {
                var digits = LogRelativeError.Of(figures[i]!.Value, row[5 + i]);
                worst = Math.Min(worst, digits);
                Assert.True(digits >= 15, $"{row[1]}, figure {i}: {figures[i]:R} against {row[5 + i]}");
            }
        }

        output.WriteLine($"fewest digits {worst:F2}");
    }

    [Fact]
    public void Figures_without_enough_values_are_absent()
    {
        var none = Descriptives.Describe(new NumberColumn("x", [double.NaN, double.NaN]));
        Assert.Equal(new NumberDescription(0, 2, 0, null, null, null, null, null, null, null, null, null), none);

        var one = Descriptives.Describe(new NumberColumn("x", [double.NaN, 3]));
        Assert.Equal(new NumberDescription(1, 1, 1, 3, null, 3, 3, 3, 3, 3, null, null), one);

        var three = Descriptives.Describe(new NumberColumn("x", [1, 2, 6]));
        Assert.NotNull(three.Skewness);
        Assert.Null(three.ExcessKurtosis);
    }

    [Fact]
    public void A_constant_has_standard_deviation_0_and_no_shape()
    {
        var column = FixtureTable.Numbers("x", ["0.1", "0.1", "0.1", "0.1", "0.1"]);
        var description = Descriptives.Describe(column);
        Assert.Equal(0.1, description.Mean);
        Assert.Equal(0, description.StandardDeviation);
        Assert.Equal(1, description.Distinct);
        Assert.Null(description.Skewness);
        Assert.Null(description.ExcessKurtosis);
        Assert.Null(Autocorrelation.Lag1(column));
    }

    [Fact]
    public void Values_that_differ_only_beyond_a_double_are_told_apart()
    {
        var column = FixtureTable.Numbers("x", ["1.00000000000000000001", "1.00000000000000000003", "1.00000000000000000001"]);
        Assert.Equal(2, Descriptives.Describe(column).Distinct);
        // standard deviation of 1, 3, 1 is √(4/3)
        Assert.InRange(LogRelativeError.Of(StandardDeviation.Of(column)!.Value, Math.Sqrt(4.0 / 3) * 1e-20), 10, 16);
    }

    [Fact]
    public void Huge_and_tiny_numbers_neither_overflow_nor_vanish()
    {
        double[] plain = [1, 2, 4, 8, 16, 5];
        var expected = Descriptives.Describe(new NumberColumn("x", plain));
        foreach (var scale in new[] { Math.ScaleB(1, 1018), Math.ScaleB(1, -1000) })
        {
            var scaled = Descriptives.Describe(new NumberColumn("x", [.. plain.Select(x => x * scale)]));
            Assert.Equal(expected.Mean * scale, scaled.Mean);
            Assert.Equal(expected.StandardDeviation * scale, scaled.StandardDeviation);
            Assert.Equal(expected.Median * scale, scaled.Median);
            Assert.Equal(expected.Skewness, scaled.Skewness);
            Assert.Equal(expected.ExcessKurtosis, scaled.ExcessKurtosis);
        }
    }

    [Fact]
    public void An_infinite_value_is_refused_with_its_row()
    {
        var refusal = Assert.Throws<ArgumentException>(() => Descriptives.Describe(new NumberColumn("x", [1, double.PositiveInfinity])));
        Assert.Contains("row 2", refusal.Message, StringComparison.Ordinal);
        Assert.Contains("'x'", refusal.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Categories_are_counted_in_their_order_with_the_empty_ones()
    {
        var description = Descriptives.Describe(new CategoryColumn("x", [2, 0, -1, 2, 2], ["a", "b", "c"]));
        Assert.Equal(4, description.N);
        Assert.Equal(1, description.Missing);
        Assert.Equal([new CategoryCount(0, "a", 1), new CategoryCount(1, "b", 0), new CategoryCount(2, "c", 3)], description.Categories);
    }

    [Fact]
    public void A_code_beyond_the_categories_is_refused()
    {
        var refusal = Assert.Throws<ArgumentException>(() => Descriptives.Describe(new CategoryColumn("x", [0, 3], ["a", "b"])));
        Assert.Contains("row 2", refusal.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Penguins_by_species_are_152_68_and_124()
    {
        // Gorman, Williams and Fraser 2014: the counts of the published table of 344 birds
        var species = (CategoryColumn)FixtureTable.Read("worked/penguins.csv", "species", "island", "sex").Find("species")!;
        Assert.Equal([152, 68, 124], Descriptives.Describe(species).Categories.Select(c => c.Count));
    }
}
