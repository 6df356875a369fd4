using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>Squares of partial and semi-partial correlations against the shares of variance that they stand for.</summary>
public sealed class PartialCorrelationTests
{
    private readonly DataTable table = SampleTable.Create(30, 3, 91);

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
}
