using System.Globalization;
using System.Text;
using ModelLab.Intake.Csv;

namespace ModelLab.Benchmarks;

/// <summary>A text table of 1,000,000 rows and 20 columns: numbers of different lengths, two columns of categories, a few missing cells.</summary>
public sealed class LargeTable
{
    /// <summary>Columns.</summary>
    public const int Columns = 20;

    private static readonly string[] Categories = ["north", "east", "south", "west", "centre"];
    private static readonly CsvDialect Dialect = new("utf-8", false, ',', '.');
    private readonly string path;

    /// <summary>Writes the table.</summary>
    public LargeTable(string path, int rows)
    {
        this.path = path;
        var random = new Random(11);
        using var writer = new StreamWriter(path, false, new UTF8Encoding(false), 1 << 20);
        writer.NewLine = "\n";
        writer.WriteLine(string.Join(',', Enumerable.Range(1, Columns).Select(Name)));
        var line = new StringBuilder();
        for (var row = 0; row < rows; row++)
        {
            line.Clear();
            for (var column = 0; column < Columns; column++)
            {
                line.Append(column == 0 ? string.Empty : ",");
                if (random.Next(200) > 0)
                {
                    line.Append(Cell(random, column));
                }
            }

            writer.WriteLine(line);
        }
    }

    /// <summary>Size of the file in bytes.</summary>
    public long Bytes => new FileInfo(path).Length;

    /// <summary>Looks the file through as an upload does.</summary>
    public void Profile() => CsvTable.Profile(() => File.OpenRead(path), new CsvOptions());

    /// <summary>Reads all columns, decimals exactly as written.</summary>
    public void Read()
    {
        using var stream = File.OpenRead(path);
        CsvTable.Read(stream, Dialect, [.. Enumerable.Range(0, Columns).Select(c => new ColumnRequest(Name(c + 1), c >= 2, [""], c >= 2 ? null : Categories))]);
    }

    private static string Name(int column) => "c" + column;

    private static string Cell(Random random, int column) => column < 2
        ? Categories[random.Next(Categories.Length)]
        : (random.NextDouble() * Math.Pow(10, column % 5)).ToString(column % 2 == 0 ? "0.000" : "0.000000", CultureInfo.InvariantCulture);
}
