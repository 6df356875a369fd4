using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>What a model would lose with a term, against the model fitted without it.</summary>
public sealed class TermLossesTests
{
    private static readonly string[] Terms = ["x1", "x1^2", "x2", "g", "x3"];

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void Losses_are_those_of_the_refitted_models(bool intercept)
    {
        var table = SampleTable.Create(40, 3, 51, 4);
        var whole = ReferenceFit.Fit(table, SampleTable.Model(Terms) with { Intercept = intercept }).Results;
        Assert.Equal(["x1^2", "x2", "g", "x3"], whole.Losses.Select(loss => loss.Term.Text));
        foreach (var loss in whole.Losses)
        {
            var without = ReferenceFit.Fit(table, SampleTable.Model([.. Terms.Where(term => term != loss.Term.Text)]) with { Intercept = intercept }).Results.Fit;
            var now = whole.Fit;
            Assert.Equal(without.SsResidual - now.SsResidual, loss.SumOfSquares, now.SsResidual * 1e-13);
            Assert.Equal(now.RSquared - without.RSquared, loss.RSquaredLoss, 1e-15);
            Assert.Equal(without.AdjustedRSquared!.Value - now.AdjustedRSquared!.Value, loss.AdjustedRSquaredChange!.Value, 1e-15);
            Assert.Equal(without.Aic!.Value - now.Aic!.Value, loss.AicChange!.Value, 1e-12);
            Assert.Equal(without.Aicc!.Value - now.Aicc!.Value, loss.AiccChange!.Value, 1e-12);
            Assert.Equal(without.Bic!.Value - now.Bic!.Value, loss.BicChange!.Value, 1e-12);
            var test = whole.Terms.Single(term => term.Term.Equals(loss.Term));
            Assert.Equal((test.F, test.P, test.Df), (loss.F, loss.P, loss.Df));
        }
    }

    [Fact]
    public void Terms_held_in_have_a_test_but_no_loss()
    {
        var table = SampleTable.Create(40, 3, 51, 4);
        var results = ReferenceFit.Fit(table, SampleTable.Model(Terms), new FitOptions(0.95, [new VariableTerm("g")])).Results;
        Assert.Equal(["x1^2", "x2", "x3"], results.Losses.Select(loss => loss.Term.Text));
        Assert.Equal([false, true, true, false, true], results.Terms.Select(term => term.Removable));
        Assert.NotNull(results.Terms[3].P);
    }

    [Fact]
    public void A_trifling_loss_keeps_its_digits()
    {
        // A term that explains next to nothing: n ln(1 + SS/RSS) must not drown in the difference of two logarithms.
        string[] x = ["1", "2", "3", "4", "5", "6"];
        string[] z = ["1", "-1", "-1", "1", "0.000000001", "0"];
        string[] y = ["3", "1", "4", "1", "5", "9"];
        var table = new DataTable([FixtureTable.Numbers("y", y), FixtureTable.Numbers("x", x), FixtureTable.Numbers("z", z)]);
        var results = SampleTable.Fit(table, "x", "z").Results;
        var loss = results.Losses[1];
        var share = loss.SumOfSquares / results.Fit.SsResidual;
        Assert.Equal((6 * (share - (share * share / 2) + (share * share * share / 3))) - 2.0, loss.AicChange!.Value, 6 * share * share * share * share);
    }
}
