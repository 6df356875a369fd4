using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>GVIF against the determinants of the correlation matrix that define it (Fox and Monette 1992).</summary>
public sealed class GeneralisedVarianceInflationFactorTests
{
    [Fact]
    public void The_factor_is_the_ratio_of_the_determinants_of_correlations()
    {
        var table = SampleTable.Create(48, 3, 71, 4);
        var results = SampleTable.Fit(table, "x1", "g", "x2", "x3").Results;
        var codes = ((CategoryColumn)table.Find("g")!).Codes.ToArray();
        double[][] columns =
        [
            Values(table, "x1"), [.. codes.Select(c => c == 1 ? 1.0 : 0.0)], [.. codes.Select(c => c == 2 ? 1.0 : 0.0)], [.. codes.Select(c => c == 3 ? 1.0 : 0.0)],
            Values(table, "x2"), Values(table, "x3"),
        ];
        var whole = Determinant(columns, 0, 1, 2, 3, 4, 5);
        Assert.Equal(Determinant(columns, 1, 2, 3) * Determinant(columns, 0, 4, 5) / whole, results.Terms[1].Vif!.Value, 1e-11);
        Assert.Equal(Determinant(columns, 1, 2, 3, 4, 5) / whole, results.Terms[0].Vif!.Value, 1e-11);
    }

    [Fact]
    public void A_term_alone_has_a_factor_of_one() =>
        Assert.Equal(1.0, SampleTable.Fit(SampleTable.Create(48, 1, 71, 4), "g").Results.Terms[0].Vif!.Value, 1e-15);

    [Fact]
    public void Without_intercept_there_is_none() =>
        Assert.Null(ReferenceFit.Fit(SampleTable.Create(48, 1, 71, 4), SampleTable.Model("g") with { Intercept = false }).Results.Terms[0].Vif);

    private static double[] Values(DataTable table, string name) => ((NumberColumn)table.Find(name)!).Values.ToArray();

    private static double Correlation(double[] a, double[] b)
    {
        var (ma, mb) = (a.Average(), b.Average());
        return a.Zip(b, (x, y) => (x - ma) * (y - mb)).Sum()
            / Math.Sqrt(a.Sum(x => (x - ma) * (x - ma)) * b.Sum(y => (y - mb) * (y - mb)));
    }

    // By elimination.
    private static double Determinant(double[][] columns, params int[] chosen)
    {
        var matrix = chosen.Select(i => chosen.Select(j => Correlation(columns[i], columns[j])).ToArray()).ToArray();
        var determinant = 1.0;
        for (var pivot = 0; pivot < matrix.Length; pivot++)
        {
            determinant *= matrix[pivot][pivot];
            for (var row = pivot + 1; row < matrix.Length; row++)
            {
                var factor = matrix[row][pivot] / matrix[pivot][pivot];
                for (var column = pivot; column < matrix.Length; column++)
                {
                    matrix[row][column] -= factor * matrix[pivot][column];
                }
            }
        }

        return determinant;
    }
}
