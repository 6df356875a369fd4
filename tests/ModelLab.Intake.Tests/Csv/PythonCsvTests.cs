using System.Text.Json;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>Against Python's csv module in strict mode; the fixtures and what it read from them are made by Fixtures/generate_python_csv.py.</summary>
public sealed class PythonCsvTests
{
    public static TheoryData<string> Files => [.. Expected().Select(e => e.GetProperty("file").GetString()!)];

    [Theory]
    [MemberData(nameof(Files))]
    public void Reads_what_the_csv_module_of_Python_reads(string file)
    {
        var expected = Expected().Single(e => e.GetProperty("file").GetString() == file);
        var bytes = File.ReadAllBytes(Fixture.Path(Path.Combine("PythonCsv", file)));

        var profile = Fixture.Profile(bytes);

        Assert.Equal(expected.GetProperty("encoding").GetString(), profile.Dialect.Encoding);
        Assert.Equal(expected.GetProperty("byteOrderMark").GetBoolean(), profile.Dialect.ByteOrderMark);
        Assert.Equal(expected.GetProperty("delimiter").GetString(), profile.Dialect.Delimiter.ToString());
        // a control character within a name becomes a space
        Assert.Equal(Texts(expected.GetProperty("header")).Select(n => n.Replace('\t', ' ')), profile.Columns.Select(c => c.Name));
        var rows = expected.GetProperty("rows").EnumerateArray().Select(Texts).ToArray();
        Assert.Equal(40, rows.Length);
        Assert.Equal(rows, Fixture.Cells(bytes, profile));
    }

    [Fact]
    public void Every_fixture_is_used() => Assert.Equal(
        Directory.GetFiles(Fixture.Path("PythonCsv"), "*.csv").Select(f => Path.GetFileName(f)).Order(StringComparer.Ordinal),
        Expected().Select(e => e.GetProperty("file").GetString()).Order(StringComparer.Ordinal));

    private static string[] Texts(JsonElement array) => [.. array.EnumerateArray().Select(e => e.GetString()!)];

    private static JsonElement[] Expected() =>
        [.. JsonDocument.Parse(File.ReadAllText(Fixture.Path(Path.Combine("PythonCsv", "expected.json")))).RootElement.EnumerateArray()];
}
