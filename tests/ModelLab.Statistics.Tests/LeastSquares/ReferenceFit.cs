using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;

namespace ModelLab.Statistics.Tests.LeastSquares;

/// <summary>Fits the reference sets and finds a named figure among the results.</summary>
public static class ReferenceFit
{
    public static readonly string[] Linear =
        ["Norris", "Pontius", "NoInt1", "NoInt2", "Filip", "Longley", "Wampler1", "Wampler2", "Wampler3", "Wampler4", "Wampler5"];

    public static readonly string[] Anova =
        ["SiRstv", "SmLs01", "SmLs02", "SmLs03", "AtmWtAg", "SmLs04", "SmLs05", "SmLs06", "SmLs07", "SmLs08", "SmLs09"];

    public static readonly string[] Worked =
        ["stackloss", "longley_full", "engel", "penguins", "anscombe_I", "anscombe_II", "anscombe_III", "anscombe_IV", "hald", "yarn"];

    public static FitOptions Options { get; } = new(0.95, []);

    /// <summary>A set of the linear kind: its terms are those that its figures name.</summary>
    public static FittedModel OfLinear(string set)
    {
        var path = $"nist/linear/{set}";
        var terms = FixtureLines.Read($"{path}.figures.csv").Where(line => line[0] == "estimate" && line[1] != "intercept").Select(line => Term(line[1]));
        var intercept = FixtureLines.Remarks($"{path}.figures.csv")["intercept"] == "yes";
        return Fit(FixtureTable.Read($"{path}.csv"), new ModelSpecification("y", [.. terms], intercept));
    }

    /// <summary>A set of the analysis-of-variance kind: the factor is the first column, its first level the reference.</summary>
    public static FittedModel OfAnova(string set)
    {
        var factor = set switch { "SiRstv" or "AtmWtAg" => "instrument", _ => "treatment" };
        return Fit(FixtureTable.Read($"nist/anova/{set}.csv", factor), new ModelSpecification("y", [new VariableTerm(factor)]));
    }

    public static FittedModel OfWorked(string set, FitOptions? options = null)
    {
        var remarks = FixtureLines.Remarks($"worked/{set}.figures.csv");
        var factors = remarks.TryGetValue("references", out var references) ? references.Split(' ').Select(pair => pair.Split(':')[0]).ToArray() : [];
        var terms = remarks["terms"].Split(' ');
        return Fit(
            FixtureTable.Read($"worked/{set}.csv", factors),
            new ModelSpecification(remarks["outcome"], [.. terms.Select(Term)]),
            options);
    }

    public static FittedModel Fit(DataTable table, ModelSpecification specification, FitOptions? options = null)
    {
        var names = specification.Terms.SelectMany(term => term.Variables).Append(specification.Outcome).ToArray();
        return ModelFitter.Fit(Design.Create(table, specification, FixtureTable.CompleteRows(table, names)), options ?? Options);
    }

    public static Term Term(string text)
    {
        var parts = text.Split('^');
        return parts.Length == 1 ? new VariableTerm(text) : new PowerTerm(parts[0], int.Parse(parts[1], System.Globalization.CultureInfo.InvariantCulture));
    }

    /// <summary>The figure that a fixture calls by this name; <paramref name="item"/> is a column or a term, empty for the whole model.</summary>
    public static double? Figure(ModelResults results, string quantity, string item)
    {
        var fit = results.Fit;
        var coefficient = item.Length == 0 ? null : results.Coefficients.FirstOrDefault(c => Name(c) == item || c.Category == item);
        var term = results.Terms.FirstOrDefault(t => t.Term.Text == item);
        return quantity switch
        {
            "estimate" => coefficient!.Estimate,
            "standard_error" => coefficient!.StandardError,
            "t" => coefficient!.T,
            "p" when item.Length > 0 => coefficient!.P,
            "lower" => coefficient!.Lower,
            "upper" => coefficient!.Upper,
            "vif" => coefficient!.Vif,
            "standardised" => coefficient!.Standardized,
            "partial_r" => coefficient!.PartialR,
            "semipartial_r" => coefficient!.SemiPartialR,
            "term_ss" => term!.SumOfSquares,
            "term_f" => term!.F,
            "term_p" => term!.P,
            "term_df" => term!.Df,
            "r_squared_without" => fit.RSquared - results.Losses.Single(loss => loss.Term.Text == item).RSquaredLoss,
            "n" => fit.N,
            "coefficients" => results.Coefficients.Count,
            "s" => fit.S,
            "r" => fit.R,
            "r_squared" => fit.RSquared,
            "adjusted_r_squared" => fit.AdjustedRSquared,
            "predicted_r_squared" => fit.PredictedRSquared,
            "ss_model" => fit.SsModel,
            "ss_residual" => fit.SsResidual,
            "ss_total" => fit.SsTotal,
            "df_model" => fit.DfModel,
            "df_residual" => fit.DfResidual,
            "ms_model" => results.Variance[0].MeanSquare,
            "ms_residual" => results.Variance[1].MeanSquare,
            "f" => fit.F,
            "p" => fit.P,
            "press" => fit.Press,
            "log_likelihood" => fit.LogLikelihood,
            "aic" => fit.Aic,
            "aicc" => fit.Aicc,
            "bic" => fit.Bic,
            _ => throw new ArgumentException($"No figure is called '{quantity}'."),
        };
    }

    /// <summary>Compares the rows with a fixture of rows; an empty cell must be a missing value.</summary>
    public static void CompareRows(FittedModel model, string path, DigitsTable digits)
    {
        var rows = model.Rows();
        var lines = FixtureLines.Read(path);
        Assert.Equal(lines.Count, rows.Fitted.Length);
        for (var row = 0; row < lines.Count; row++)
        {
            double?[] values = [rows.Fitted[row], rows.Residual[row], rows.Leverage[row], rows.StudentizedInternal[row], rows.StudentizedExternal[row], rows.CooksDistance[row]];
            string[] names = ["fitted", "residual", "leverage", "studentised_internal", "studentised_external", "cooks_distance"];
            for (var column = 0; column < names.Length; column++)
            {
                if (lines[row][column].Length == 0)
                {
                    Assert.Null(values[column]);
                }
                else
                {
                    digits.Add(names[column], values[column], lines[row][column]);
                }
            }
        }
    }

    private static string Name(CoefficientResult coefficient) =>
        coefficient.Term is null ? "intercept" : coefficient.Category is null ? coefficient.Term.Text : $"{coefficient.Term.Text}[{coefficient.Category}]";
}
