using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>Log-likelihood and criteria by their formulas, and where they do not exist.</summary>
public sealed class InformationCriteriaTests
{
    private readonly DataTable table = SampleTable.Create(30, 3, 91);

    [Fact]
    public void Criteria_follow_their_formulas_and_count_the_variance()
    {
        var fit = SampleTable.Fit(table, "x1", "x2").Results.Fit;
        var likelihood = -15.0 * (Math.Log(2 * Math.PI * fit.SsResidual / 30) + 1);
        Assert.Equal(likelihood, fit.LogLikelihood!.Value, 1e-12);
        Assert.Equal((-2 * likelihood) + 8, fit.Aic!.Value, 1e-12);
        Assert.Equal((-2 * likelihood) + 8 + (2.0 * 4 * 5 / (30 - 4 - 1)), fit.Aicc!.Value, 1e-12);
        Assert.Equal((-2 * likelihood) + (4 * Math.Log(30)), fit.Bic!.Value, 1e-12);
    }

    [Fact]
    public void Small_sample_criterion_does_not_exist_with_too_few_rows()
    {
        var few = SampleTable.Create(5, 3, 91);
        var results = SampleTable.Fit(few, "x1", "x2", "x3").Results;
        Assert.Null(results.Fit.Aicc);
        Assert.NotNull(results.Fit.Aic);
        Assert.All(results.Losses, loss => Assert.Null(loss.AiccChange));
    }
}
