using System.Globalization;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Selection;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Selection;

/// <summary>Elimination of the Hald set (1952) against paths recomputed at 100 digits, and the rules one by one.</summary>
public sealed class BackwardEliminationTests
{
    private static readonly DataTable Hald = FixtureTable.Read("worked/hald.csv");

    [Theory]
    [InlineData("0.05")]
    [InlineData("0.10")]
    [InlineData("0.15")]
    public void By_p_the_path_is_the_recomputed_one(string removeAbove)
    {
        var expected = FixtureLines.Read("worked/hald_elimination.csv").Where(line => line[0] == removeAbove).ToArray();
        var steps = Eliminate(new ChoosingRule(Criterion.P, double.Parse(removeAbove, CultureInfo.InvariantCulture)));
        Assert.Equal(expected.Length, steps.Count);
        foreach (var (line, step) in expected.Zip(steps))
        {
            Assert.Equal(line[2], Names(step));
            Assert.Equal(line[3], step.Choice.Weakest!.Term.Text);
            Assert.True(LogRelativeError.Of(step.Choice.Weakest.P!.Value, line[4]) >= 14);
            Assert.True(LogRelativeError.Of(step.Choice.Weakest.F!.Value, line[5]) >= 15);
            Assert.Equal(line[6] != "stop", step.Choice.Remove);
        }
    }

    [Theory]
    [InlineData(Criterion.Aic, "aic_without_sigma")]
    [InlineData(Criterion.Bic, "bic_without_sigma")]
    [InlineData(Criterion.AdjustedRSquared, "adjusted_r_squared")]
    public void By_a_criterion_every_step_is_the_best_of_the_table_of_all_subsets(Criterion criterion, string column)
    {
        var subsets = Subsets();
        double Of(IEnumerable<string> terms) => double.Parse(subsets[string.Join(' ', terms)][column], CultureInfo.InvariantCulture) * (criterion == Criterion.AdjustedRSquared ? -1 : 1);
        var terms = new List<string> { "x1", "x2", "x3", "x4" };
        var steps = Eliminate(new ChoosingRule(criterion, null));
        foreach (var step in steps)
        {
            Assert.Equal(string.Join(' ', terms), Names(step));
            var best = terms.MinBy(term => Of(terms.Where(other => other != term)))!;
            var removes = Of(terms.Where(other => other != best)) <= Of(terms);
            Assert.Equal(best, step.Choice.Weakest!.Term.Text);
            Assert.Equal(removes, step.Choice.Remove);
            terms.Remove(best);
        }

        Assert.False(steps[^1].Choice.Remove);
    }

    [Fact]
    public void Figures_of_all_subsets_agree_with_the_table()
    {
        var full = SampleTable.Fit(Hald, "x1", "x2", "x3", "x4").Results.Fit;
        foreach (var (terms, line) in Subsets())
        {
            var names = terms.Split(' ', StringSplitOptions.RemoveEmptyEntries);
            var fit = ReferenceFit.Fit(Hald, SampleTable.Model(names), new FitOptions(0.95, [], full.SsResidual / full.DfResidual)).Results.Fit;
            var digits = new DigitsTable();
            digits.Add("ss_residual", fit.SsResidual, line["ss_residual"]);
            digits.Add("r_squared", fit.RSquared, line["r_squared"]);
            digits.Add("adjusted_r_squared", fit.AdjustedRSquared, line["adjusted_r_squared"]);
            digits.Add("cp", fit.Cp, line["cp"]);
            digits.Add("press", fit.Press, line["press"]);
            digits.Add("predicted_r_squared", fit.PredictedRSquared, line["predicted_r_squared"]);
            digits.Add("aic", fit.Aic - 2, line["aic_without_sigma"]);
            digits.Add("bic", fit.Bic - Math.Log(13), line["bic_without_sigma"]);
            Assert.True(digits.Least >= 13.5, $"{terms}: {digits}");
        }
    }

    [Fact]
    public void Equal_values_are_broken_by_the_later_place()
    {
        // x and z are mirror images, each as good as the other.
        var table = new DataTable(
        [
            SampleTable.Number("y", 1, 0, 0, 1, 5, 5, 2, 2),
            SampleTable.Number("x", 1, -1, 1, -1, 0, 0, 2, -2),
            SampleTable.Number("z", -1, 1, 1, -1, 0, 0, 2, -2),
            SampleTable.Number("w", 1, 1, -1, -1, 2, -2, 0, 0),
        ]);
        TermLoss Loss(string name, double p, double change) => new(new VariableTerm(name), 1, 1.0, p, 1.0, 0.1, -change, change, change, change);
        var results = SampleTable.Fit(table, "x", "z", "w").Results with
        {
            Losses = [Loss("x", 0.7, -1.5), Loss("z", 0.7, -1.5), Loss("w", 0.2, -1.0)],
        };
        Assert.All(Enum.GetValues<Criterion>(), criterion =>
            Assert.Equal("z", BackwardElimination.Choose(results, new ChoosingRule(criterion, criterion == Criterion.P ? 0.05 : null)).Weakest!.Term.Text));
    }

    [Fact]
    public void A_p_at_the_threshold_stays_and_a_criterion_that_stays_lets_go()
    {
        TermLoss loss = new(new VariableTerm("x1"), 1, 1.0, 0.05, 1.0, 0.1, 0.0, 0.0, 0.0, 0.0);
        var results = SampleTable.Fit(Hald, "x1").Results with { Losses = [loss] };
        Assert.False(BackwardElimination.Choose(results, new ChoosingRule(Criterion.P, 0.05)).Remove);
        Assert.True(BackwardElimination.Choose(results, new ChoosingRule(Criterion.P, 0.0499)).Remove);
        Assert.True(BackwardElimination.Choose(results, new ChoosingRule(Criterion.Aic, null)).Remove);
        Assert.True(BackwardElimination.Choose(results, new ChoosingRule(Criterion.AdjustedRSquared, null)).Remove);
        Assert.False(BackwardElimination.Choose(results with { Losses = [loss with { BicChange = 1e-9 }] }, new ChoosingRule(Criterion.Bic, null)).Remove);
    }

    [Theory]
    [InlineData(Criterion.P, null)]
    [InlineData(Criterion.P, 0.0)]
    [InlineData(Criterion.P, 1.0)]
    [InlineData(Criterion.P, double.NaN)]
    [InlineData(Criterion.Bic, 0.05)]
    public void A_rule_that_says_too_little_or_too_much_is_refused(Criterion criterion, double? removeAbove) =>
        Assert.Throws<ArgumentException>(() => BackwardElimination.Choose(SampleTable.Fit(Hald, "x1").Results, new ChoosingRule(criterion, removeAbove)));

    [Fact]
    public void The_sentence_names_the_term_the_number_and_the_outcome()
    {
        var steps = Eliminate(new ChoosingRule(Criterion.P, 0.05));
        Assert.Equal("x3 has the largest p of the terms that may be removed, 0.8959, above 0.05: it is removed.", steps[0].Choice.Explanation);
        Assert.Equal("x1 has the largest p of the terms that may be removed, 2.692E-07, not above 0.05: nothing is removed.", steps[2].Choice.Explanation);
        Assert.Equal("Without x3 AIC is lowest of all removals, -1.97 against now: it is removed.", Eliminate(new ChoosingRule(Criterion.Aic, null))[0].Choice.Explanation);
    }

    [Fact]
    public void What_cannot_be_judged_is_said()
    {
        var few = SampleTable.Fit(SampleTable.Create(5, 3, 91), "x1", "x2", "x3").Results;
        var choice = BackwardElimination.Choose(few, new ChoosingRule(Criterion.Aicc, null));
        Assert.False(choice.Remove);
        Assert.Null(choice.Weakest);
        Assert.Contains("5 rows and 4 coefficients", choice.Explanation, StringComparison.Ordinal);

        var exact = ReferenceFit.OfLinear("Wampler1").Results;
        choice = BackwardElimination.Choose(exact, new ChoosingRule(Criterion.Aic, null));
        Assert.False(choice.Remove);
        Assert.Contains("exactly", choice.Explanation, StringComparison.Ordinal);

        choice = BackwardElimination.Choose(SampleTable.Fit(Hald).Results, new ChoosingRule(Criterion.P, 0.05));
        Assert.Equal((null, false, "No term of the model may be removed."), (choice.Weakest, choice.Remove, choice.Explanation));
    }

    [Fact]
    public void Terms_held_in_stay_to_the_end_and_powers_leave_from_the_top()
    {
        var table = SampleTable.Create(40, 3, 113, 3);
        var steps = BackwardElimination.Run(
            table, SampleTable.Model("x3", "x3^2", "x3^3", "x1", "g"), SampleTable.AllRows(table), new ChoosingRule(Criterion.P, 0.000001), new FitOptions(0.95, [new VariableTerm("x1")]));
        var left = steps.Where(step => step.Choice.Remove).Select(step => step.Choice.Weakest!.Term.Text).ToArray();
        Assert.Contains("x1", Names(steps[^1]), StringComparison.Ordinal);
        Assert.Equal(["x3^3", "x3^2", "x3"], left.Where(term => term.StartsWith("x3", StringComparison.Ordinal)));
        Assert.Null(steps[0].Results.Fit.Cp);
        Assert.All(steps.Skip(1), step => Assert.NotNull(step.Results.Fit.Cp));
    }

    private static IReadOnlyList<EliminationStep> Eliminate(ChoosingRule rule) =>
        BackwardElimination.Run(Hald, SampleTable.Model("x1", "x2", "x3", "x4"), SampleTable.AllRows(Hald), rule, ReferenceFit.Options);

    private static string Names(EliminationStep step) => string.Join(' ', step.Specification.Terms.Select(term => term.Text));

    private static Dictionary<string, Dictionary<string, string>> Subsets()
    {
        string[] names = ["terms", "ss_residual", "r_squared", "adjusted_r_squared", "cp", "press", "predicted_r_squared", "aic_without_sigma", "bic_without_sigma"];
        return FixtureLines.Read("worked/hald_subsets.csv").ToDictionary(
            line => line[0],
            line => names.Zip(line).ToDictionary(pair => pair.First, pair => pair.Second));
    }
}
