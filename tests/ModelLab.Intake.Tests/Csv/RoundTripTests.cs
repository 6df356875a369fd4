using System.Text;
using System.Text.RegularExpressions;
using CsCheck;
using ModelLab.Intake.Csv;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>Random tables, written by <see cref="LiteralCsvWriter"/> in every dialect, read back cell by cell.</summary>
public sealed partial class RoundTripTests
{
    private static readonly Gen<string> Cell = Gen.OneOf(
        Gen.OneOf("", "a", "yes", "1", "-2.5", "3,5", "NA", " x ", "\"", "\"\"", "\r\n", "é", "€uro", "x\ty", "a,b;c|d", "'", "#", "=1"),
        Gen.String[Gen.Char["ab1 ,;|\t\"\r\n.é€ß"], 0, 8]);

    private static readonly Gen<Table> Tables =
        from columns in Gen.Int[1, 6]
        from rows in Cell.Array[columns].Array[1, 12]
        from delimiter in Gen.OneOf(',', ';', '\t', '|')
        from lineEnd in Gen.OneOf("\n", "\r\n", "\r")
        from quotes in Gen.Bool.Array[columns * 13]
        from last in Gen.Bool
        from encoding in Gen.OneOf("utf-8", "utf-8 with mark", "windows-1252")
        select new Table([.. Enumerable.Range(0, columns).Select(i => $"v{i}")], rows, delimiter, lineEnd, quotes, last, encoding);

    [Fact]
    public void Tables_are_read_back_as_they_were()
    {
        FixedDraws.Each(
            Tables,
            54,
            3000,
            table =>
            {
                var bytes = table.Bytes();
                var dialect = new CsvDialect(table.Encoding == "windows-1252" ? "windows-1252" : "utf-8", table.Encoding == "utf-8 with mark", table.Delimiter, '.');
                var columns = CsvTable.Read(new MemoryStream(bytes), dialect, [.. table.Header.Select(name => new ColumnRequest(name, false, []))]).Columns
                    .Cast<ModelLab.Statistics.Designs.CategoryColumn>().ToArray();
                var read = Enumerable.Range(0, columns[0].Rows).Select(row => columns.Select(c => c.Codes[row] < 0 ? null : c.Categories[c.Codes[row]]).ToArray());
                Assert.Equal(table.Rows.Select(row => row.Select(Expected).ToArray()), read);
            });
    }

    [Fact]
    public void Profiles_of_tables_count_what_was_written()
    {
        var profiled = 0;
        FixedDraws.Each(
            Tables,
            55,
            3000,
            table =>
            {
                TableProfile profile;
                try
                {
                    profile = CsvTable.Profile(new MemoryStream(table.Bytes()), new CsvOptions(table.Delimiter, '.', table.Encoding == "windows-1252" ? "windows-1252" : null));
                }
                catch (IntakeRefusedException refused)
                {
                    // the only refusals of a well-formed table are numbers that a point as decimal mark does not explain
                    Assert.All(refused.Problems, p => Assert.Contains("mark", p.Message, StringComparison.Ordinal));
                    return;
                }

                profiled++;
                Assert.Equal(table.Rows.Length, profile.Rows);
                for (var c = 0; c < table.Header.Length; c++)
                {
                    var present = table.Rows.Select(r => r[c]).Where(cell => Expected(cell) is not null && cell.Trim() != "NA" && cell.Trim() != ".").ToArray();
                    Assert.Equal(table.Rows.Length - present.Length, profile.Columns[c].Missing);
                    Assert.Equal(present.Length, profile.Columns[c].Values.Sum(v => v.Count));
                }
            });
        Assert.InRange(profiled, 2000, 3000);
    }

    // Spaces belong to a text and not to a number, whichever decimal mark it is written with.
    private static string? Expected(string cell)
    {
        var trimmed = cell.Trim(' ', '\t', '\r', '\n');
        return trimmed.Length == 0 ? null : Number().IsMatch(trimmed) ? trimmed : cell;
    }

    [GeneratedRegex(@"\A[+-]?([0-9]+[.,]?[0-9]*|[.,][0-9]+)\z")]
    private static partial Regex Number();

    private sealed record Table(string[] Header, string[][] Rows, char Delimiter, string LineEnd, bool[] Quotes, bool LastLineEnd, string Encoding)
    {
        internal byte[] Bytes()
        {
            var text = LiteralCsvWriter.Write([Header, .. Rows], Delimiter, LineEnd, i => Quotes[i % Quotes.Length], LastLineEnd);
            return Encoding switch
            {
                "windows-1252" => CodePagesEncodingProvider.Instance.GetEncoding(1252)!.GetBytes(text),
                "utf-8" => Fixture.Utf8(text),
                _ => [0xEF, 0xBB, 0xBF, .. Fixture.Utf8(text)],
            };
        }
    }
}
