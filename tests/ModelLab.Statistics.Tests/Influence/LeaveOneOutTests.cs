using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Influence;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Influence;

/// <summary>Row-wise figures against fits in which the row was left out.</summary>
public sealed class LeaveOneOutTests
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

    [Fact]
    public void Externally_studentised_residuals_use_the_fit_without_the_row()
    {
        var rows = SampleTable.Fit(table, "x1", "x2").Rows();
        foreach (var row in SampleTable.AllRows(table))
        {
            var s = Without(row).Results.Fit.S;
            Assert.Equal(rows.Residual[row] / (s * Math.Sqrt(1 - rows.Leverage[row])), rows.StudentizedExternal[row]!.Value, 1e-12);
        }
    }

    [Fact]
    public void Internally_studentised_residuals_use_the_fit_with_the_row()
    {
        var model = SampleTable.Fit(table, "x1", "x2");
        var rows = model.Rows();
        Assert.All(SampleTable.AllRows(table), row => Assert.Equal(
            rows.Residual[row] / (model.Results.Fit.S * Math.Sqrt(1 - rows.Leverage[row])), rows.StudentizedInternal[row]!.Value, 1e-13));
    }

    [Fact]
    public void A_row_that_fixes_a_coefficient_alone_has_leverage_one_and_no_studentised_residual()
    {
        var single = new DataTable([.. table.Columns, new NumberColumn("only", [.. Enumerable.Range(0, 16).Select(row => row == 5 ? 1.0 : 0.0)])]);
        var model = SampleTable.Fit(single, "x1", "only");
        var rows = model.Rows();
        Assert.Equal(1.0, rows.Leverage[5], 1e-15);
        Assert.Equal(0.0, rows.Residual[5], 1e-25);
        Assert.Null(rows.StudentizedInternal[5] ?? rows.StudentizedExternal[5] ?? rows.CooksDistance[5]);
        Assert.NotNull(rows.CooksDistance[4]);
        Assert.Null(model.Results.Fit.Press);
        Assert.Null(model.Results.Fit.PredictedRSquared);
        Assert.NotNull(model.Results.Fit.F);
    }

    [Fact]
    public void Where_leaving_a_row_out_makes_the_fit_exact_the_external_residual_does_not_exist()
    {
        var line = new DataTable([FixtureTable.Numbers("y", ["1.1", "2.1", "3.1", "4.1", "9"]), FixtureTable.Numbers("x", ["1", "2", "3", "4", "5"])]);
        var rows = SampleTable.Fit(line, "x").Rows();
        Assert.Null(rows.StudentizedExternal[4]);
        Assert.NotNull(rows.StudentizedInternal[4]);
        Assert.NotNull(rows.StudentizedExternal[3]);
    }

    [Fact]
    public void Leverages_next_to_one_are_still_told_from_it()
    {
        var far = new DataTable([FixtureTable.Numbers("y", ["1", "3", "2", "5"]), FixtureTable.Numbers("x", ["1", "2", "3", "1e7"])]);
        var model = SampleTable.Fit(far, "x");
        Assert.NotNull(model.Rows().StudentizedInternal[3]);
        Assert.NotNull(model.Results.Fit.Press);
        Assert.Null(Leverage.Complement(1.0));
        Assert.Equal(0.25, Leverage.Complement(0.75)!.Value.Hi);
    }

    private FittedModel Without(int row) =>
        ModelFitter.Fit(Design.Create(table, SampleTable.Model("x1", "x2"), [.. SampleTable.AllRows(table).Where(other => other != row)]), ReferenceFit.Options);

    private double Predict(FittedModel model, int row)
    {
        var b = model.Results.Coefficients;
        return b[0].Estimate + (b[1].Estimate * ((NumberColumn)table.Find("x1")!).Values[row]) + (b[2].Estimate * ((NumberColumn)table.Find("x2")!).Values[row]);
    }
}
