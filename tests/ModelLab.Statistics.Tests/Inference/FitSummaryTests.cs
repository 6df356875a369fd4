using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Distributions;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>Figures of the whole model by their formulas, and where they do not exist.</summary>
public sealed class FitSummaryTests
{
    private readonly DataTable table = SampleTable.Create(30, 3, 91);

    [Fact]
    public void Criteria_follow_their_formulas_and_count_the_variance()
    {
        var fit = SampleTable.Fit(table, "x1", "x2").Results.Fit;
        var likelihood = -15.0 * (Math.Log(2 * Math.PI * fit.SsResidual / 30) + 1);
        Assert.Equal(likelihood, fit.LogLikelihood!.Value, 1e-12);
        Assert.Equal((-2 * likelihood) + 8, fit.Aic!.Value, 1e-12);
        Assert.Equal((-2 * likelihood) + 8 + (2.0 * 4 * 5 / (30 - 4 - 1)), fit.Aicc!.Value, 1e-12);
        Assert.Equal((-2 * likelihood) + (4 * Math.Log(30)), fit.Bic!.Value, 1e-12);
    }

    [Fact]
    public void Small_sample_criterion_does_not_exist_with_too_few_rows()
    {
        var few = SampleTable.Create(5, 3, 91);
        var results = SampleTable.Fit(few, "x1", "x2", "x3").Results;
        Assert.Null(results.Fit.Aicc);
        Assert.NotNull(results.Fit.Aic);
        Assert.All(results.Losses, loss => Assert.Null(loss.AiccChange));
    }

    [Fact]
    public void Predicted_sum_of_squares_is_that_of_fits_without_each_row()
    {
        var sum = 0.0;
        var all = SampleTable.AllRows(table);
        foreach (var row in all)
        {
            var others = ModelFitter.Fit(Design.Create(table, SampleTable.Model("x1", "x2"), [.. all.Where(other => other != row)]), ReferenceFit.Options);
            var b = others.Results.Coefficients;
            var error = At("y", row) - b[0].Estimate - (b[1].Estimate * At("x1", row)) - (b[2].Estimate * At("x2", row));
            sum += error * error;
        }

        var fit = SampleTable.Fit(table, "x1", "x2").Results.Fit;
        Assert.Equal(sum, fit.Press!.Value, sum * 1e-13);
        Assert.Equal(1 - (sum / fit.SsTotal), fit.PredictedRSquared!.Value, 1e-13);
    }

    [Fact]
    public void Mallows_cp_of_the_full_model_is_its_number_of_coefficients()
    {
        var full = SampleTable.Fit(table, "x1", "x2", "x3").Results.Fit;
        var square = full.SsResidual / full.DfResidual;
        var same = ReferenceFit.Fit(table, SampleTable.Model("x1", "x2", "x3"), new FitOptions(0.95, [], square)).Results.Fit;
        var less = ReferenceFit.Fit(table, SampleTable.Model("x1"), new FitOptions(0.95, [], square)).Results.Fit;
        Assert.Null(full.Cp);
        Assert.Equal(4.0, same.Cp!.Value, 1e-13);
        Assert.Equal((less.SsResidual / square) - 30 + 4, less.Cp!.Value, 1e-12);
        Assert.Null(ReferenceFit.Fit(table, SampleTable.Model("x1"), new FitOptions(0.95, [], 0.0)).Results.Fit.Cp);
    }

    [Fact]
    public void The_mean_alone_explains_nothing()
    {
        var model = SampleTable.Fit(table);
        var fit = model.Results.Fit;
        Assert.Equal((0.0, 0.0, 0.0, 0), (fit.RSquared, fit.AdjustedRSquared!.Value, fit.SsModel, fit.DfModel));
        Assert.Null(fit.F);
        Assert.Null(fit.P);
        Assert.Null(model.Results.Variance[0].MeanSquare);
        Assert.Equal(fit.SsTotal, fit.SsResidual);
        Assert.Equal(((NumberColumn)table.Find("y")!).Values.ToArray().Average(), model.Results.Coefficients[0].Estimate, 1e-13);
        Assert.All(model.Rows().Leverage, h => Assert.Equal(1.0 / 30, h, 1e-16));
        Assert.Empty(model.Results.Losses);
    }

    [Fact]
    public void The_table_of_variance_adds_up()
    {
        var results = SampleTable.Fit(table, "x1", "x2", "x3").Results;
        Assert.Equal([VarianceSource.Model, VarianceSource.Residual, VarianceSource.Total], results.Variance.Select(line => line.Source));
        Assert.Equal([3, 26, 29], results.Variance.Select(line => line.Df));
        Assert.Equal(results.Variance[2].SumOfSquares, results.Variance[0].SumOfSquares + results.Variance[1].SumOfSquares, 1e-11);
        Assert.Equal(results.Variance[0].MeanSquare!.Value / results.Variance[1].MeanSquare!.Value, results.Variance[0].F!.Value, 1e-12);
        Assert.Equal((results.Fit.F, results.Fit.P), (results.Variance[0].F, results.Variance[0].P));
    }

    [Theory]
    [InlineData(0.9)]
    [InlineData(0.99)]
    public void Intervals_follow_the_level_asked_for(double confidence)
    {
        var results = ReferenceFit.Fit(table, SampleTable.Model("x1", "x2"), new FitOptions(confidence, [])).Results;
        Assert.All(results.Coefficients, c =>
        {
            Assert.Equal(c.Estimate, (c.Lower!.Value + c.Upper!.Value) / 2, 1e-13);
            var t = (c.Upper.Value - c.Lower.Value) / 2 / c.StandardError!.Value;
            Assert.Equal(1 - confidence, StudentT.TwoSided(t, 27), 1e-12);
        });
    }

    [Fact]
    public void Semipartial_squares_are_the_losses_of_explained_variance()
    {
        var results = SampleTable.Fit(table, "x1", "x2", "x3").Results;
        for (var term = 0; term < 3; term++)
        {
            var coefficient = results.Coefficients[term + 1];
            Assert.Equal(results.Losses[term].RSquaredLoss, coefficient.SemiPartialR!.Value * coefficient.SemiPartialR.Value, 1e-15);
            Assert.Equal(results.Terms[term].PartialRSquared!.Value, coefficient.PartialR!.Value * coefficient.PartialR.Value, 1e-15);
            Assert.Equal(Math.Sign(coefficient.Estimate), Math.Sign(coefficient.PartialR.Value));
        }
    }

    private double At(string name, int row) => ((NumberColumn)table.Find(name)!).Values[row];
}
