using ModelLab.Projects.Replaying;

namespace ModelLab.Projects.Tests;

public sealed class FigureComparisonTests
{
    [Fact]
    public void Equal_figures_differ_by_nothing_and_others_by_their_share()
    {
        Assert.Equal(0, FigureComparison.LargestRelativeDifference(new Figures(1.5, "x", [1, 2]), new Figures(1.5, "x", [1, 2])));
        Assert.Equal(0.5, FigureComparison.LargestRelativeDifference(new Figures(1.5, "x", [1, 2]), new Figures(1.5, "x", [1, 4])));
        Assert.Equal(1, FigureComparison.LargestRelativeDifference(new Figures(0, "x", []), new Figures(1e-300, "x", [])));
    }

    [Fact]
    public void Other_texts_counts_and_missing_values_cannot_be_compared()
    {
        Assert.Null(FigureComparison.LargestRelativeDifference(new Figures(1, "x", []), new Figures(1, "y", [])));
        Assert.Null(FigureComparison.LargestRelativeDifference(new Figures(1, "x", [1]), new Figures(1, "x", [])));
        Assert.Null(FigureComparison.LargestRelativeDifference(new Figures(1, "x", []), new Figures(null, "x", [])));
    }

    [Fact]
    public void A_figure_invented_later_is_no_difference_where_that_is_allowed_and_a_lost_one_always_is()
    {
        var before = new Figures(null, "x", [1]);
        var after = new Figures(2.5, "x", [1]);
        Assert.Null(FigureComparison.LargestRelativeDifference(before, after));
        Assert.Equal(0, FigureComparison.LargestRelativeDifference(before, after, laterFigures: true));
        Assert.Null(FigureComparison.LargestRelativeDifference(after, before, laterFigures: true));
    }

    private sealed record Figures(double? First, string Name, double[] Others);
}
