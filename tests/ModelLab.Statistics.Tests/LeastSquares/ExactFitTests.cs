using System.Globalization;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Selection;

namespace ModelLab.Statistics.Tests.LeastSquares;

public sealed class ExactFitTests
{
    [Theory]
    [InlineData("Wampler1")]
    [InlineData("Wampler2")]
    public void A_polynomial_without_error_is_recognised(string set)
    {
        var model = ReferenceFit.OfLinear(set);
        var fit = model.Results.Fit;
        Assert.True(fit.ExactFit);
        Assert.Equal((0.0, 0.0, 1.0, 1.0), (fit.S, fit.SsResidual, fit.RSquared, fit.R));
        Assert.All([fit.F, fit.P, fit.LogLikelihood, fit.Aic, fit.Aicc, fit.Bic], figure => Assert.Null(figure));
        Assert.All(model.Results.Coefficients, c => Assert.True((c.StandardError ?? c.T ?? c.P ?? c.Lower ?? c.Upper ?? c.PartialR ?? c.SemiPartialR) is null));
        Assert.All(model.Results.Terms, term => Assert.True((term.F ?? term.P ?? term.PartialRSquared) is null));
        Assert.All(model.Rows().StudentizedInternal.Concat(model.Rows().StudentizedExternal).Concat(model.Rows().CooksDistance), value => Assert.Null(value));
        Assert.False(BackwardElimination.Choose(model.Results, new ChoosingRule(Criterion.P, 0.05)).Remove);
    }

    [Theory]
    [InlineData("Wampler3")]
    [InlineData("Filip")]
    public void A_close_fit_is_not_an_exact_one(string set) => Assert.False(ReferenceFit.OfLinear(set).Results.Fit.ExactFit);

    [Theory]
    [InlineData(40, 30)]
    [InlineData(3000, 5)]
    public void A_sum_of_decimals_is_fitted_exactly_by_its_parts(int rows, int numbers)
    {
        var table = SampleTable.Create(rows, numbers, 121);
        var terms = Enumerable.Range(1, numbers).Select(i => $"x{i}").ToArray();
        string Written(decimal value) => value.ToString(CultureInfo.InvariantCulture);
        decimal At(string name, int row) => (decimal)((NumberColumn)table.Find(name)!).Values[row];
        var outcome = Enumerable.Range(0, rows).Select(row => 0.7m + terms.Select((name, i) => At(name, row) * ((i % 7) - 2.9m)).Sum());
        var decimals = new DataTable(
        [
            FixtureTable.Numbers("y", [.. outcome.Select(Written)]),
            .. terms.Select(name => FixtureTable.Numbers(name, [.. Enumerable.Range(0, rows).Select(row => Written(At(name, row)))])),
        ]);
        var results = SampleTable.Fit(decimals, terms).Results;
        Assert.True(results.Fit.ExactFit);
        Assert.Equal(0.7, results.Coefficients[0].Estimate);
        Assert.All(results.Coefficients.Skip(1).Select((c, i) => (c.Estimate, Expected: (i % 7) - 2.9)), pair => Assert.Equal(pair.Expected, pair.Estimate, 1e-15));
    }

    [Fact]
    public void An_error_in_the_twentieth_digit_is_seen_where_it_is_written()
    {
        string[] x = ["1", "2", "3", "4", "5"];
        string[] exact = ["1.1", "2.2", "3.3", "4.4", "5.5"];
        string[] off = ["1.1", "2.2", "3.3", "4.4", "5.5000000000000000001"];
        Assert.True(SampleTable.Fit(new DataTable([FixtureTable.Numbers("y", exact), FixtureTable.Numbers("x", x)]), "x").Results.Fit.ExactFit);
        var fit = SampleTable.Fit(new DataTable([FixtureTable.Numbers("y", off), FixtureTable.Numbers("x", x)]), "x").Results.Fit;
        Assert.False(fit.ExactFit);

        // The residual of the last point is 0.4 of the error: RSS = 0.4·(1e-19)².
        Assert.Equal(0.4e-38, fit.SsResidual, 1e-48);
    }

    [Fact]
    public void Numbers_that_fit_to_the_digits_of_a_double_only_are_no_exact_fit()
    {
        var x = Enumerable.Range(1, 20).Select(i => i / 7.0).ToArray();
        var table = new DataTable([new NumberColumn("y", [.. x.Select(v => (v * 1.7) + 0.3)]), new NumberColumn("x", x)]);
        var fit = SampleTable.Fit(table, "x").Results.Fit;
        Assert.False(fit.ExactFit);
        Assert.InRange(fit.S, 1e-18, 1e-14);
    }
}
