using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Influence;

/// <summary>Studentised residuals by their formulas, the external ones against fits in which the row was left out.</summary>
public sealed class StudentizedResidualsTests
{
    private readonly DataTable table = SampleTable.Create(16, 2, 101);

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
    public void Where_leaving_a_row_out_makes_the_fit_exact_the_external_residual_does_not_exist()
    {
        var line = new DataTable([FixtureTable.Numbers("y", ["1.1", "2.1", "3.1", "4.1", "9"]), FixtureTable.Numbers("x", ["1", "2", "3", "4", "5"])]);
        var rows = SampleTable.Fit(line, "x").Rows();
        Assert.Null(rows.StudentizedExternal[4]);
        Assert.NotNull(rows.StudentizedInternal[4]);
        Assert.NotNull(rows.StudentizedExternal[3]);
    }

    private FittedModel Without(int row) =>
        ModelFitter.Fit(Design.Create(table, SampleTable.Model("x1", "x2"), [.. SampleTable.AllRows(table).Where(other => other != row)]), ReferenceFit.Options);
}
