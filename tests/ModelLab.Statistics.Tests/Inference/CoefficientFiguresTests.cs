using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Distributions;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>Intervals of coefficients at other levels than the fixtures have.</summary>
public sealed class CoefficientFiguresTests
{
    private readonly DataTable table = SampleTable.Create(30, 3, 91);

    [Theory]
    [InlineData(0.9)]
    [InlineData(0.99)]
    public void Intervals_follow_the_level_asked_for(double confidence)
    {
        var results = ReferenceFit.Fit(table, SampleTable.Model("x1", "x2"), new FitOptions(confidence, [])).Results;
        Assert.All(results.Coefficients, c =>
        {
            Assert.Equal(c.Estimate, (c.Lower!.Value + c.Upper!.Value) / 2, 1e-13);
            var t = (c.Upper.Value - c.Lower.Value) / 2 / c.StandardError!.Value;
            Assert.Equal(1 - confidence, StudentT.TwoSided(t, 27), 1e-12);
        });
    }
}
