using System.Globalization;
using System.Runtime.InteropServices;
using System.Text;
using ModelLab.Statistics.Designs;

namespace ModelLab.Benchmarks;

/// <summary>Predictors and an outcome with a fixed seed; every third predictor has an effect, neighbours are correlated.</summary>
public sealed class RegressionData
{
    /// <summary>Draws the data.</summary>
    public RegressionData(int rows, int predictors, int seed)
    {
        var random = new Random(seed);
        double Normal() => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
        Columns = [.. Enumerable.Range(0, predictors).Select(_ => new double[rows])];
        Outcome = new double[rows];
        for (var i = 0; i < rows; i++)
        {
            var last = 0.0;
            for (var j = 0; j < predictors; j++)
            {
                last = Math.Round((0.4 * last) + Normal(), 6);
                Columns[j][i] = last;
                Outcome[i] += j % 3 == 0 ? last * (0.2 + (j % 5 * 0.1)) : 0;
            }

            Outcome[i] = Math.Round(Outcome[i] + (2 * Normal()), 6);
        }

        Table = new DataTable([new NumberColumn("y", Outcome), .. Columns.Select((c, j) => new NumberColumn(Name(j), c))]);
        Terms = [.. Enumerable.Range(0, predictors).Select(j => new VariableTerm(Name(j)))];
        Rows = [.. Enumerable.Range(0, rows)];
    }

    /// <summary>The predictors.</summary>
    public IReadOnlyList<double[]> Columns { get; }

    /// <summary>The outcome.</summary>
    public double[] Outcome { get; }

    /// <summary>Predictors and outcome as a table.</summary>
    public DataTable Table { get; }

    /// <summary>All predictors as terms.</summary>
    public IReadOnlyList<Term> Terms { get; }

    /// <summary>All rows.</summary>
    public int[] Rows { get; }

    /// <summary>Writes raw doubles for the peers: the outcome, then predictor after predictor.</summary>
    public void WriteRaw(string path)
    {
        using var stream = File.Create(path);
        stream.Write(MemoryMarshal.AsBytes<double>(Outcome));
        foreach (var column in Columns)
        {
            stream.Write(MemoryMarshal.AsBytes<double>(column));
        }
    }

    /// <summary>The data as a text table.</summary>
    public byte[] ToCsv()
    {
        var text = new StringBuilder("y");
        text.AppendJoin(string.Empty, Enumerable.Range(0, Columns.Count).Select(j => "," + Name(j))).Append('\n');
        foreach (var i in Rows)
        {
            text.Append(Outcome[i].ToString(CultureInfo.InvariantCulture));
            foreach (var column in Columns)
            {
                text.Append(',').Append(column[i].ToString(CultureInfo.InvariantCulture));
            }

            text.Append('\n');
        }

        return Encoding.UTF8.GetBytes(text.ToString());
    }

    private static string Name(int predictor) => "x" + (predictor + 1);
}
