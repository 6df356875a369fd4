using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>Cp by its formula; the fixture of all subsets is compared where elimination is tested.</summary>
public sealed class MallowsCpTests
{
    private readonly DataTable table = SampleTable.Create(30, 3, 91);

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
}
