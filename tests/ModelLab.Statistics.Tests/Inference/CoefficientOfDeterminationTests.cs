using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>R² and adjusted R² by their formulas; published values are compared where fits are tested.</summary>
public sealed class CoefficientOfDeterminationTests
{
    [Fact]
    public void Adjustment_charges_for_every_column()
    {
        Assert.Equal(0.75, CoefficientOfDetermination.Of(25.0, 100.0).Hi);
        Assert.Equal(1 - (25.0 / 8 / (100.0 / 10)), CoefficientOfDetermination.Adjusted(25.0, 8, 100.0, 10).Hi, 1e-16);
        Assert.True(CoefficientOfDetermination.Adjusted(99.0, 5, 100.0, 10).Hi < 0);
    }

    [Fact]
    public void Without_intercept_both_are_about_zero()
    {
        // NIST NoInt1: R² certified about zero.
        var fit = ReferenceFit.OfLinear("NoInt1").Results.Fit;
        Assert.Equal(0.999365492298663, fit.RSquared, 1e-14);
        Assert.Equal(1 - (fit.SsResidual / 10 / (fit.SsTotal / 11)), fit.AdjustedRSquared!.Value, 1e-15);
    }

    [Fact]
    public void Multiple_r_is_the_correlation_of_outcome_and_fitted_values()
    {
        var model = ReferenceFit.OfWorked("stackloss");
        var fitted = model.Rows().Fitted;
        var outcome = fitted.Zip(model.Rows().Residual, (f, e) => f + e).ToArray();
        var (mf, mo) = (fitted.Average(), outcome.Average());
        var r = fitted.Zip(outcome, (f, o) => (f - mf) * (o - mo)).Sum()
            / Math.Sqrt(fitted.Sum(f => (f - mf) * (f - mf)) * outcome.Sum(o => (o - mo) * (o - mo)));
        Assert.Equal(r, model.Results.Fit.R, 1e-14);
    }
}
