using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;

namespace ModelLab.Statistics.Tests.LeastSquares;

/// <summary>Fits against the normal equations solved literally in fractions, over blocks of rows, and in other units.</summary>
public sealed class LeastSquaresFitTests
{
    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    public void Every_figure_agrees_with_the_normal_equations_in_fractions(int seed)
    {
        var table = SampleTable.Create(14, 2, seed, 3);
        var model = SampleTable.Fit(table, "x1", "x1^2", "x1^3", "x2", "g");
        var codes = ((CategoryColumn)table.Find("g")!).Codes.ToArray();
        var x1 = Exact(table, "x1");
        var x2 = Exact(table, "x2");
        var one = new Fraction(1, 1);
        var literal = new LiteralLeastSquares(
            [.. Enumerable.Range(0, 14).Select(row => new[]
            {
                one, x1[row], x1[row] * x1[row], x1[row] * x1[row] * x1[row], x2[row], codes[row] == 1 ? one : Fraction.Zero, codes[row] == 2 ? one : Fraction.Zero,
            })],
            Exact(table, "y"));

        var rows = model.Rows();
        Near(literal.ResidualSumOfSquares, model.Results.Fit.SsResidual);
        for (var row = 0; row < 14; row++)
        {
            Near(literal.Residuals[row], rows.Residual[row]);
            Near(literal.Leverages[row], rows.Leverage[row]);
        }

        for (var column = 0; column < 7; column++)
        {
            Near(literal.Coefficients[column], model.Results.Coefficients[column].Estimate);
            var variance = literal.ResidualSumOfSquares * literal.Inverse[column][column] / new Fraction(7, 1);
            var error = model.Results.Coefficients[column].StandardError!.Value;
            Assert.Equal(Math.Sqrt(variance.ToDouble()), error, error * 4e-16);
        }
    }

    [Fact]
    public void Without_intercept_the_normal_equations_are_met_too()
    {
        var table = SampleTable.Create(9, 2, 5);
        var model = ReferenceFit.Fit(table, SampleTable.Model("x1", "x2") with { Intercept = false });
        var literal = new LiteralLeastSquares([.. Exact(table, "x1").Zip(Exact(table, "x2"), (a, b) => new[] { a, b })], Exact(table, "y"));
        Near(literal.Coefficients[0], model.Results.Coefficients[0].Estimate);
        Near(literal.Coefficients[1], model.Results.Coefficients[1].Estimate);
        var total = LiteralLeastSquares.Sum(Exact(table, "y").Select(y => y * y));
        Near((total - literal.ResidualSumOfSquares) / total, model.Results.Fit.RSquared);
        Assert.Equal(7, model.Results.Fit.DfResidual);
        Assert.Equal(9, model.Results.Variance[2].Df);
        Assert.All(model.Results.Coefficients, c => Assert.Null(c.Vif ?? c.Standardized));
    }

    [Theory]
    [InlineData(511)]
    [InlineData(512)]
    [InlineData(513)]
    [InlineData(1500)]
    [InlineData(32_768)]
    [InlineData(70_001)]
    public void Rows_in_many_blocks_give_the_line_of_the_textbook(int count)
    {
        // Whole numbers, so that the sums of the textbook formula are exact.
        var x = Enumerable.Range(0, count).Select(i => (double)((i * 7919L) % 1000)).ToArray();
        var y = Enumerable.Range(0, count).Select(i => (double)(((i * 104_729L) % 1000) + (i % 13))).ToArray();
        var table = new DataTable([new NumberColumn("y", y), new NumberColumn("x1", x)]);
        var model = SampleTable.Fit(table, "x1");

        Int128 n = count, sx = 0, sy = 0, sxx = 0, sxy = 0, syy = 0;
        for (var i = 0; i < count; i++)
        {
            sx += (long)x[i];
            sy += (long)y[i];
            sxx += (long)(x[i] * x[i]);
            sxy += (long)(x[i] * y[i]);
            syy += (long)(y[i] * y[i]);
        }

        var slope = new Fraction((System.Numerics.BigInteger)((n * sxy) - (sx * sy)), (System.Numerics.BigInteger)((n * sxx) - (sx * sx)));
        var spread = new Fraction((System.Numerics.BigInteger)((n * syy) - (sy * sy)), (System.Numerics.BigInteger)n);
        var explained = slope * new Fraction((System.Numerics.BigInteger)((n * sxy) - (sx * sy)), (System.Numerics.BigInteger)n);
        Near(slope, model.Results.Coefficients[1].Estimate);
        Near(spread - explained, model.Results.Fit.SsResidual);
        Near(spread, model.Results.Fit.SsTotal);
        var rows = model.Rows();
        Assert.Equal(2.0, rows.Leverage.Sum(), 1e-9);
        Assert.Equal(y[^1], rows.Fitted[^1] + rows.Residual[^1], 1e-9);
    }

    [Fact]
    public void Units_change_nothing_but_the_units()
    {
        var table = SampleTable.Create(40, 3, 11);
        var metres = SampleTable.Fit(table, "x1", "x1^2", "x2", "x3");
        var small = new DataTable([.. table.Columns.Select(column => (Column)new NumberColumn(column.Name, [.. ((NumberColumn)column).Values.ToArray().Select(v => v * 1.0e-30)]))]);
        var scaled = SampleTable.Fit(small, "x1", "x1^2", "x2", "x3");
        Assert.Equal(metres.Results.Fit.F!.Value, scaled.Results.Fit.F!.Value, metres.Results.Fit.F.Value * 1e-13);
        Assert.Equal(metres.Results.Coefficients[2].Estimate, scaled.Results.Coefficients[2].Estimate * 1e-30, Math.Abs(metres.Results.Coefficients[2].Estimate) * 1e-13);
        Assert.Equal(metres.Results.Coefficients[3].T!.Value, scaled.Results.Coefficients[3].T!.Value, 1e-12);
    }

    [Fact]
    public void Two_hundred_columns_are_fitted()
    {
        var table = SampleTable.Create(420, 200, 8);
        var model = SampleTable.Fit(table, [.. Enumerable.Range(1, 200).Select(i => $"x{i}")]);
        Assert.Equal(219, model.Results.Fit.DfResidual);
        Assert.Equal(201.0, model.Rows().Leverage.Sum(), 1e-10);
        Assert.Equal(0.0, model.Rows().Residual.Sum(), 1e-10);
        Assert.All(model.Results.Terms, term => Assert.True(term.Vif >= 1.0));
    }

    [Fact]
    public void Fifty_predictors_are_used_as_three_are()
    {
        var table = SampleTable.Create(120, 50, 4);
        var all = Enumerable.Range(1, 50).Select(i => $"x{i}").ToArray();
        var model = SampleTable.Fit(table, all);
        var without = SampleTable.Fit(table, [.. all.Where(name => name != "x17")]);
        Assert.Equal(without.Results.Fit.SsResidual - model.Results.Fit.SsResidual, model.Results.Terms[16].SumOfSquares, model.Results.Fit.SsResidual * 1e-13);
    }

    [Fact]
    public void The_confidence_level_must_be_one() =>
        Assert.Throws<ArgumentOutOfRangeException>(() => ReferenceFit.Fit(SampleTable.Create(9, 1, 5), SampleTable.Model("x1"), new FitOptions(95, [])));

    private static Fraction[] Exact(DataTable table, string name) => [.. ((NumberColumn)table.Find(name)!).Values.ToArray().Select(Fraction.Of)];

    private static void Near(Fraction expected, double actual) =>
        Assert.Equal(expected.ToDouble(), actual, Math.Abs(expected.ToDouble()) * 2.3e-16);
}
