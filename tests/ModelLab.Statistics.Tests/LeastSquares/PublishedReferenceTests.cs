namespace ModelLab.Statistics.Tests.LeastSquares;

/// <summary>
/// The NIST/ITL Statistical Reference Datasets for linear regression and analysis of variance: figures certified to 15 digits, and the
/// same recomputed to 25 digits and more.
/// </summary>
public sealed class PublishedReferenceTests(ITestOutputHelper output)
{
    private const double Goal = 14.0;

    public static TheoryData<string> LinearSets => [.. ReferenceFit.Linear];

    public static TheoryData<string> AnovaSets => [.. ReferenceFit.Anova];

    [Theory]
    [MemberData(nameof(LinearSets))]
    public void Linear_regression_reaches_fourteen_digits(string set) => Reaches(ReferenceFit.OfLinear(set), $"nist/linear/{set}", set);

    [Theory]
    [MemberData(nameof(AnovaSets))]
    public void Analysis_of_variance_reaches_fourteen_digits(string set) => Reaches(ReferenceFit.OfAnova(set), $"nist/anova/{set}", set);

    [Fact]
    public void Table_of_right_digits()
    {
        var lowest = double.PositiveInfinity;
        foreach (var (folder, set) in ReferenceFit.Linear.Select(set => ("linear", set)).Concat(ReferenceFit.Anova.Select(set => ("anova", set))))
        {
            var model = folder == "linear" ? ReferenceFit.OfLinear(set) : ReferenceFit.OfAnova(set);
            var (certified, recomputed) = Compare(model.Results, $"nist/{folder}/{set}.figures.csv");
            output.WriteLine(FormattableString.Invariant($"{set,-9} certified {certified.Least:F1}  recomputed {recomputed.Least:F1}"));
            lowest = Math.Min(lowest, certified.Least);
        }

        Assert.True(lowest >= Goal, FormattableString.Invariant($"The least of all sets is {lowest:F2} digits."));
    }

    private void Reaches(Statistics.Inference.FittedModel model, string path, string set)
    {
        var (certified, recomputed) = Compare(model.Results, $"{path}.figures.csv");
        if (File.Exists(Path.Combine(AppContext.BaseDirectory, "Fixtures", $"{path}.rows.csv")))
        {
            ReferenceFit.CompareRows(model, $"{path}.rows.csv", recomputed);
        }

        output.WriteLine($"{set}, certified: {certified}");
        output.WriteLine($"{set}, recomputed: {recomputed}");
        Assert.True(certified.Least >= Goal, certified.ToString());
        Assert.True(recomputed.Least >= Goal, recomputed.ToString());
    }

    private static (DigitsTable Certified, DigitsTable Recomputed) Compare(Statistics.Inference.ModelResults results, string path)
    {
        var certified = new DigitsTable();
        var recomputed = new DigitsTable();
        foreach (var line in FixtureLines.Read(path))
        {
            // Certified standard errors of zero and infinite F: at an exact fit they do not exist, and that is what is said.
            var isMissing = results.Fit.ExactFit && line[0] is "standard_error" or "t" or "p" or "f" or "log_likelihood" && results.Fit.ExactFit;
            var value = ReferenceFit.Figure(results, line[0], line[1]);
            if (isMissing)
            {
                Assert.Null(value);
                continue;
            }

            if (line[2].Length > 0)
            {
                certified.Add(line[0], value, line[2]);
            }

            recomputed.Add(line[0], value, line[3]);
        }

        Assert.True(recomputed.Quantities >= 10);
        return (certified, recomputed);
    }
}
