using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Influence;

namespace ModelLab.Statistics.Tests.Influence;

/// <summary>Leverages at and next to one; every other leverage is compared with the fixtures and with fractions where fits are tested.</summary>
public sealed class LeverageTests
{
    private readonly DataTable table = SampleTable.Create(16, 2, 101);

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
    public void Leverages_next_to_one_are_still_told_from_it()
    {
        var far = new DataTable([FixtureTable.Numbers("y", ["1", "3", "2", "5"]), FixtureTable.Numbers("x", ["1", "2", "3", "1e7"])]);
        var model = SampleTable.Fit(far, "x");
        Assert.NotNull(model.Rows().StudentizedInternal[3]);
        Assert.NotNull(model.Results.Fit.Press);
        Assert.Null(Leverage.Complement(1.0));
        Assert.Equal(0.25, Leverage.Complement(0.75)!.Value.Hi);
    }
}
