using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Designs;

public sealed class MarginalityTests
{
    [Theory]
    [InlineData("x", "x^2", true)]
    [InlineData("x^2", "x^3", true)]
    [InlineData("x^3", "x^2", false)]
    [InlineData("x^2", "x^2", false)]
    [InlineData("x", "z^2", false)]
    [InlineData("x", "z", false)]
    [InlineData("x^2", "x", false)]
    public void A_lower_power_is_needed_by_a_higher_one(string lower, string higher, bool needed) =>
        Assert.Equal(needed, Marginality.IsNeededBy(LeastSquares.ReferenceFit.Term(lower), LeastSquares.ReferenceFit.Term(higher)));

    [Fact]
    public void Only_terms_that_nothing_holds_may_leave()
    {
        var model = SampleTable.Model("x", "x^2", "x^3", "w", "z");
        Term[] heldIn = [new VariableTerm("w")];
        Assert.Equal(["x^3", "z"], model.Terms.Where(term => Marginality.IsRemovable(term, model, heldIn)).Select(term => term.Text));
    }

    [Fact]
    public void The_last_term_of_a_model_without_intercept_stays()
    {
        var model = SampleTable.Model("x");
        Assert.True(Marginality.IsRemovable(model.Terms[0], model, []));
        Assert.False(Marginality.IsRemovable(model.Terms[0], model with { Intercept = false }, []));
    }
}
