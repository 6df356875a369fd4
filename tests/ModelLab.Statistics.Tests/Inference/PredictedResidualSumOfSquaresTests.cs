using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>PRESS against fits in which each row was left out.</summary>
public sealed class PredictedResidualSumOfSquaresTests
{
    private readonly DataTable table = SampleTable.Create(30, 3, 91);

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

    private double At(string name, int row) => ((NumberColumn)table.Find(name)!).Values[row];
}
