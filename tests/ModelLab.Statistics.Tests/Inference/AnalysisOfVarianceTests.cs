using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>The table of variance, and the model of the mean alone.</summary>
public sealed class AnalysisOfVarianceTests
{
    private readonly DataTable table = SampleTable.Create(30, 3, 91);

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
}
