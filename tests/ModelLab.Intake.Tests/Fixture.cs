using System.Text;
using ModelLab.Intake.Csv;
using ModelLab.Statistics.Designs;

namespace ModelLab.Intake.Tests;

/// <summary>Ways of getting a table into a test and out again.</summary>
internal static class Fixture
{
    internal static string Path(string name) => System.IO.Path.Combine(AppContext.BaseDirectory, "Fixtures", name);

    internal static byte[] Utf8(string text) => Encoding.UTF8.GetBytes(text);

    internal static TableProfile Profile(string text, CsvOptions? options = null) => Profile(Utf8(text), options);

    internal static TableProfile Profile(byte[] bytes, CsvOptions? options = null) => CsvTable.Profile(new MemoryStream(bytes), options ?? new CsvOptions());

    /// <summary>The profile of one column named <paramref name="name"/> beside a column that keeps lines from being blank.</summary>
    internal static ColumnProfile Column(string name, IEnumerable<string> cells, CsvOptions? options = null) =>
        Profile($"{name}\tbeside\n" + string.Concat(cells.Select((c, i) => $"{c}\t{(i * 37) % 101}.25\n")), options ?? new CsvOptions(Delimiter: '\t')).Columns[0];

    internal static IEnumerable<string> Codes(ColumnProfile column) => column.Questions.Select(q => q.Code);

    internal static IntakeRefusedException Refused(byte[] bytes, CsvOptions? options = null) =>
        Assert.Throws<IntakeRefusedException>(() => Profile(bytes, options));

    /// <summary>All cells of a file, read as categories: null where missing.</summary>
    internal static string?[][] Cells(byte[] bytes, TableProfile profile)
    {
        var table = CsvTable.Read(new MemoryStream(bytes), profile.Dialect, [.. profile.Columns.Select(c => new ColumnRequest(c.Name, false, []))]);
        var columns = table.Columns.Cast<CategoryColumn>().ToArray();
        return [.. Enumerable.Range(0, table.Rows).Select(row => columns.Select(c => c.Codes[row] < 0 ? null : c.Categories[c.Codes[row]]).ToArray())];
    }
}
