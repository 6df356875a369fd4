using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;

namespace ModelLab.Statistics.Tests;

/// <summary>Invented tables from a fixed seed: numbers with three decimals, categories, an outcome that depends on some of them.</summary>
public static class SampleTable
{
    /// <summary>Columns y, x1 … xk, and the category g with the letters a, b, c … where asked for.</summary>
    public static DataTable Create(int rows, int numbers, int seed, int categories = 0)
    {
        var random = new Random(seed);
        var columns = new List<Column>();
        var outcome = new double[rows];
        for (var column = 1; column <= numbers; column++)
        {
            var values = new double[rows];
            for (var row = 0; row < rows; row++)
            {
                values[row] = Math.Round((random.NextDouble() * 10.0) + (column > 1 && column % 2 == 0 ? ((NumberColumn)columns[column - 2]).Values[row] : 0.0), 3);
                outcome[row] += values[row] * (column % 3) / column;
            }

            columns.Add(new NumberColumn($"x{column}", values));
        }

        if (categories > 0)
        {
            var codes = new int[rows];
            for (var row = 0; row < rows; row++)
            {
                codes[row] = row < categories ? row : random.Next(categories);
                outcome[row] += codes[row];
            }

            columns.Add(new CategoryColumn("g", codes, [.. Enumerable.Range(0, categories).Select(c => ((char)('a' + c)).ToString())]));
        }

        for (var row = 0; row < rows; row++)
        {
            outcome[row] = Math.Round(outcome[row] + (random.NextDouble() * 4.0), 3);
        }

        columns.Insert(0, new NumberColumn("y", outcome));
        return new DataTable(columns);
    }

    public static ModelSpecification Model(params string[] terms) => new("y", [.. terms.Select(LeastSquares.ReferenceFit.Term)]);

    public static FittedModel Fit(DataTable table, params string[] terms) => LeastSquares.ReferenceFit.Fit(table, Model(terms));

    public static NumberColumn Number(string name, params double[] values) => new(name, values);

    public static CategoryColumn Category(string name, string codes, string categories, int reference = 0) =>
        new(name, [.. codes.Select(code => categories.IndexOf(code, StringComparison.Ordinal))], [.. categories.Select(c => c.ToString())], reference);

    public static int[] AllRows(DataTable table) => [.. Enumerable.Range(0, table.Rows)];
}
