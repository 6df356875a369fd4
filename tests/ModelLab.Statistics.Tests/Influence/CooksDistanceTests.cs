using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Influence;

/// <summary>Cook's distance against fits in which the row was left out.</summary>
public sealed class CooksDistanceTests
{
    private readonly DataTable table = SampleTable.Create(16, 2, 101);

    [Fact]
    public void Cooks_distance_is_the_shift_of_all_fitted_values()
    {
        var whole = SampleTable.Fit(table, "x1", "x2");
        var rows = whole.Rows();
        foreach (var row in SampleTable.AllRows(table))
        {
            var shift = SampleTable.AllRows(table).Sum(other => Math.Pow(rows.Fitted[other] - Predict(Without(row), other), 2));
            Assert.Equal(shift / (3 * whole.Results.Fit.S * whole.Results.Fit.S), rows.CooksDistance[row]!.Value, 1e-12);
        }
    }

    private FittedModel Without(int row) =>
        ModelFitter.Fit(Design.Create(table, SampleTable.Model("x1", "x2"), [.. SampleTable.AllRows(table).Where(other => other != row)]), ReferenceFit.Options);

    private double Predict(FittedModel model, int row)
    {
        var b = model.Results.Coefficients;
        return b[0].Estimate + (b[1].Estimate * ((NumberColumn)table.Find("x1")!).Values[row]) + (b[2].Estimate * ((NumberColumn)table.Find("x2")!).Values[row]);
    }
}
