using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>VIF against the regression of each column on all others.</summary>
public sealed class VarianceInflationFactorTests
{
    [Fact]
    public void The_factor_is_that_of_the_regression_on_all_other_columns()
    {
        var table = SampleTable.Create(45, 4, 61);
        string[] all = ["x1", "x2", "x3", "x4"];
        var results = SampleTable.Fit(table, all).Results;
        for (var column = 0; column < all.Length; column++)
        {
            var others = all.Where((_, other) => other != column).Select(ReferenceFit.Term).ToArray();
            var rSquared = ReferenceFit.Fit(table, new ModelSpecification(all[column], others)).Results.Fit.RSquared;
            Assert.Equal(1.0 / (1.0 - rSquared), results.Coefficients[column + 1].Vif!.Value, 1e-12);
            Assert.Equal(results.Coefficients[column + 1].Vif, results.Terms[column].Vif);
        }
    }

    [Fact]
    public void Uncorrelated_columns_have_a_factor_of_one() =>
        Assert.All(ReferenceFit.OfWorked("yarn").Results.Terms, term => Assert.Equal(1.0, term.Vif!.Value, 1e-15));

    [Fact]
    public void The_intercept_has_none() => Assert.Null(ReferenceFit.OfWorked("yarn").Results.Coefficients[0].Vif);
}
