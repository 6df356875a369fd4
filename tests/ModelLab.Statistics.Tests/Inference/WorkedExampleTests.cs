using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>
/// Open data sets with every figure recomputed at 100 digits (the sources stand in the fixtures): coefficients with intervals, term
/// tests, whole-model figures and rows.
/// </summary>
public sealed class WorkedExampleTests(ITestOutputHelper output)
{
    private const double Goal = 13.0;

    public static TheoryData<string> Sets => [.. ReferenceFit.Worked];

    [Theory]
    [MemberData(nameof(Sets))]
    public void All_figures_reach_thirteen_digits(string set)
    {
        var model = ReferenceFit.OfWorked(set);
        var digits = new DigitsTable();
        foreach (var line in FixtureLines.Read($"worked/{set}.figures.csv"))
        {
            var value = ReferenceFit.Figure(model.Results, line[0], line[1]);
            if (line[2].Length == 0)
            {
                Assert.True(value is null, $"{line[0]} {line[1]} is {value}, and should not exist");
            }
            else
            {
                digits.Add(line[0], value, line[2]);
            }
        }

        ReferenceFit.CompareRows(model, $"worked/{set}.rows.csv", digits);
        output.WriteLine($"{set}: {digits}");
        Assert.True(digits.Quantities >= 25, digits.ToString());
        Assert.True(digits.Least >= Goal, digits.ToString());
    }

    [Fact]
    public void Penguins_lose_their_eleven_incomplete_rows() => Assert.Equal(333, ReferenceFit.OfWorked("penguins").Results.Fit.N);
}
