using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Distributions;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>Partial F against the difference of two fits, against published tables, and against the choice of coding.</summary>
public sealed class PartialFTestTests
{
    [Theory]
    [InlineData("x1")]
    [InlineData("x1^2")]
    [InlineData("x2")]
    [InlineData("x3")]
    [InlineData("g")]
    public void A_test_from_the_fit_is_the_difference_of_two_fits(string term)
    {
        var table = SampleTable.Create(60, 3, 31, 4);
        string[] terms = ["x1", "x1^2", "x2", "g", "x3"];
        var whole = SampleTable.Fit(table, terms).Results;
        var part = SampleTable.Fit(table, [.. terms.Where(other => other != term)]).Results;
        var test = whole.Terms.Single(result => result.Term.Text == term);
        var difference = part.Fit.SsResidual - whole.Fit.SsResidual;
        var f = difference / test.Df / (whole.Fit.SsResidual / whole.Fit.DfResidual);
        Assert.Equal(part.Fit.DfResidual - whole.Fit.DfResidual, test.Df);
        Assert.Equal(difference, test.SumOfSquares, 1e-12 * whole.Fit.SsResidual);
        Assert.Equal(f, test.F!.Value, 1e-10 * f);
        Assert.Equal(FisherF.UpperTail(f, test.Df, whole.Fit.DfResidual), test.P!.Value, 1e-9 * test.P.Value);
        Assert.Equal(difference / part.Fit.SsResidual, test.PartialRSquared!.Value, 1e-12);
    }

    [Fact]
    public void F_of_one_column_is_the_square_of_its_t_and_shares_its_p()
    {
        var results = ReferenceFit.OfWorked("stackloss").Results;
        Assert.All(results.Terms.Zip(results.Coefficients.Skip(1)), pair =>
        {
            Assert.Equal(pair.Second.T!.Value * pair.Second.T.Value, pair.First.F!.Value, 1e-14 * pair.First.F.Value);
            Assert.Equal(pair.Second.P, pair.First.P);
            Assert.Equal(FisherF.UpperTail(pair.First.F.Value, 1, results.Fit.DfResidual), pair.First.P!.Value, 1e-12 * pair.First.P.Value);
        });
    }

    [Fact]
    public void Main_effects_of_the_penguins_agree_with_the_two_way_table()
    {
        // Sums of squares of type II in the fixture: each main effect given the other, recomputed at 60 digits.
        var table = FixtureTable.Read("worked/penguins.csv", "species", "sex", "island");
        var results = ReferenceFit.Fit(table, new ModelSpecification("body_mass_g", [new VariableTerm("species"), new VariableTerm("sex")])).Results;
        foreach (var line in TwoWay("type2").Where(line => line[1] is "species" or "sex"))
        {
            var term = results.Terms.Single(result => result.Term.Text == line[1]);
            Assert.Equal(int.Parse(line[2], System.Globalization.CultureInfo.InvariantCulture), term.Df);
            Assert.True(LogRelativeError.Of(term.SumOfSquares, line[3]) >= 15);
        }
    }

    [Fact]
    public void Marginal_tests_of_the_penguins_agree_with_the_two_way_table()
    {
        // Type III: columns that add up to zero over the categories, and their products, written out by hand.
        var table = WithDeviationColumns();
        var whole = ReferenceFit.Fit(table, Masses("a", "b", "s", "as", "bs")).Results;
        Assert.True(LogRelativeError.Of(whole.Fit.SsResidual, FixtureLines.Remarks("worked/penguins_twoway.csv")["ss_residual"]) >= 15);
        foreach (var line in TwoWay("type3"))
        {
            string[] own = line[1] switch { "species" => ["a", "b"], "sex" => ["s"], _ => ["as", "bs"] };
            var others = new[] { "a", "b", "s", "as", "bs" }.Except(own).ToArray();
            var without = ReferenceFit.Fit(table, Masses(others)).Results;
            var f = (without.Fit.SsResidual - whole.Fit.SsResidual) / own.Length / (whole.Fit.SsResidual / whole.Fit.DfResidual);
            Assert.True(LogRelativeError.Of(f, line[4]) >= 12);
            if (own.Length == 1)
            {
                var test = whole.Terms.Single(term => term.Term.Text == own[0]);
                Assert.True(LogRelativeError.Of(test.SumOfSquares, line[3]) >= 15);
                Assert.True(LogRelativeError.Of(test.F!.Value, line[4]) >= 15);
                Assert.True(LogRelativeError.Of(test.P!.Value, line[5]) >= 13);
            }
        }
    }

    [Theory]
    [InlineData("1")]
    [InlineData("2")]
    [InlineData("3")]
    [InlineData("4")]
    [InlineData("5")]
    public void Five_codings_of_one_factor_give_the_published_f(string coding)
    {
        // NIST SiRstv: the certified F holds whatever the coding; the coefficients are recomputed for each.
        const string path = "worked/SiRstv_codings.csv";
        var lines = FixtureLines.Read(path).Where(line => line[0] == coding).ToArray();
        var codes = lines.Where(line => line[1] == "code").ToDictionary(line => line[2], line => line[3].Split(' '));
        var data = FixtureLines.Read("nist/anova/SiRstv.csv");
        var columns = Enumerable.Range(0, 4).Select(c => (Column)FixtureTable.Numbers($"c{c + 1}", [.. data.Select(row => codes[row[0]][c])]));
        var table = new DataTable([FixtureTable.Numbers("y", [.. data.Select(row => row[1])]), .. columns]);
        var results = SampleTable.Fit(table, "c1", "c2", "c3", "c4").Results;

        var remarks = FixtureLines.Remarks(path);
        Assert.True(LogRelativeError.Of(results.Fit.F!.Value, remarks["certified_f"]) >= 14);
        Assert.True(LogRelativeError.Of(results.Fit.RSquared, remarks["certified_r_squared"]) >= 14);
        Assert.True(LogRelativeError.Of(results.Fit.F!.Value, remarks["recomputed_f"]) >= 15);
        Assert.True(LogRelativeError.Of(results.Fit.P!.Value, remarks["recomputed_p"]) >= 14);
        foreach (var line in lines.Where(line => line[1] == "coefficient"))
        {
            var coefficient = results.Coefficients.Single(c => (c.Term?.Text ?? "intercept") == line[2]);
            Assert.True(LogRelativeError.Of(coefficient.Estimate, line[3]) >= 15);
            Assert.True(LogRelativeError.Of(coefficient.StandardError!.Value, line[4]) >= 15);
            Assert.True(LogRelativeError.Of(coefficient.T!.Value, line[5]) >= 15);
            Assert.True(LogRelativeError.Of(coefficient.P!.Value, line[6]) >= 13);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    public void The_reference_category_changes_nothing_but_the_single_coefficients(int reference)
    {
        var table = SampleTable.Create(50, 2, 41, 4);
        var column = (CategoryColumn)table.Find("g")!;
        var other = new DataTable([.. table.Columns.Where(c => c.Name != "g"), new CategoryColumn("g", column.Codes.ToArray(), column.Categories, reference)]);
        var first = SampleTable.Fit(table, "x1", "g", "x2");
        var second = SampleTable.Fit(other, "x1", "g", "x2");
        Assert.Equal(column.Categories[reference], second.Design.Codings[0].Reference);
        Close(Figures(first), Figures(second));
        Close(first.Rows().Fitted, second.Rows().Fitted);
        Close(first.Rows().Leverage, second.Rows().Leverage);

        var firstOf = first.Results.Coefficients.Single(c => c.CategoryIndex == reference);
        var secondOf = second.Results.Coefficients.Single(c => c.CategoryIndex == 0);
        Assert.Equal(firstOf.Estimate, -secondOf.Estimate, 1e-14);
        Assert.Equal(firstOf.StandardError!.Value, secondOf.StandardError!.Value, 1e-14);
    }

    private static double[] Figures(FittedModel model)
    {
        var fit = model.Results.Fit;
        return
        [
            fit.F!.Value, fit.S, fit.RSquared, fit.Press!.Value, fit.Aic!.Value, fit.P!.Value,
            .. model.Results.Terms.SelectMany(term => new[] { term.SumOfSquares, term.F!.Value, term.P!.Value, term.Vif!.Value }),
            .. model.Results.Losses.SelectMany(loss => new[] { loss.RSquaredLoss, loss.AicChange!.Value, loss.AiccChange!.Value, loss.BicChange!.Value }),
        ];
    }

    private static void Close(double[] first, double[] second) =>
        Assert.All(first.Zip(second), pair => Assert.Equal(pair.First, pair.Second, Math.Abs(pair.First) * 1e-14));

    private static IEnumerable<string[]> TwoWay(string type) => FixtureLines.Read("worked/penguins_twoway.csv").Where(line => line[0] == type);

    private static ModelSpecification Masses(params string[] terms) => new("body_mass_g", [.. terms.Select(ReferenceFit.Term)]);

    private static DataTable WithDeviationColumns()
    {
        var rows = FixtureLines.Read("worked/penguins.csv").Where(row => row[6].Length > 0 && row[5].Length > 0).ToArray();
        double Species(string[] row, string own) => row[0] == own ? 1 : row[0] == "Gentoo" ? -1 : 0;
        double Sex(string[] row) => row[6] == "FEMALE" ? 1 : -1;
        NumberColumn Column(string name, Func<string[], double> value) => new(name, [.. rows.Select(value)]);
        return new DataTable(
        [
            FixtureTable.Numbers("body_mass_g", [.. rows.Select(row => row[5])]),
            Column("a", row => Species(row, "Adelie")),
            Column("b", row => Species(row, "Chinstrap")),
            Column("s", Sex),
            Column("as", row => Species(row, "Adelie") * Sex(row)),
            Column("bs", row => Species(row, "Chinstrap") * Sex(row)),
        ]);
    }
}
