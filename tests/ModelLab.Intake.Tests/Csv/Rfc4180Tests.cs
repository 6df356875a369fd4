using ModelLab.Intake.Csv;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>The examples of RFC 4180, section 2, each under its rule number; the names of the header are those of rule 3.</summary>
public sealed class Rfc4180Tests
{
    private const string Header = "field_name_a,field_name_b,field_name_c\r\n";

    [Fact]
    public void Rule_1_each_record_stands_on_its_own_line() => Reads(Header + "aaa,bbb,ccc\r\nzzz,yyy,xxx\r\n", ["aaa", "bbb", "ccc"], ["zzz", "yyy", "xxx"]);

    [Fact]
    public void Rule_2_the_last_record_may_lack_its_line_end() => Reads(Header + "aaa,bbb,ccc\r\nzzz,yyy,xxx", ["aaa", "bbb", "ccc"], ["zzz", "yyy", "xxx"]);

    [Fact]
    public void Rule_3_the_first_line_may_be_a_header() =>
        Assert.Equal(["field_name_a", "field_name_b", "field_name_c"], Fixture.Profile(Header + "aaa,bbb,ccc\r\n").Columns.Select(c => c.Name));

    [Fact]
    public void Rule_4_spaces_are_part_of_a_field() => Reads(Header + " aaa,bbb ,c c\r\n", [" aaa", "bbb ", "c c"]);

    [Fact]
    public void Rule_5_fields_may_be_enclosed_in_quotes() => Reads(Header + "\"aaa\",\"bbb\",\"ccc\"\r\nzzz,yyy,xxx", ["aaa", "bbb", "ccc"], ["zzz", "yyy", "xxx"]);

    [Fact]
    public void Rule_5_quotes_may_not_appear_inside_a_field_without_quotes()
    {
        var problem = Assert.Single(Fixture.Refused(Fixture.Utf8(Header + "aaa,b\"bb,ccc\r\n")).Problems);

        Assert.Equal(1, problem.Row);
        Assert.Equal("field_name_b", problem.Column);
    }

    [Fact]
    public void Rule_6_line_breaks_and_commas_stand_in_quotes() =>
        Reads(Header + "\"aaa\",\"b\r\nbb\",\"c,cc\"\r\nzzz,yyy,xxx", ["aaa", "b\r\nbb", "c,cc"], ["zzz", "yyy", "xxx"]);

    [Fact]
    public void Rule_7_a_quote_in_quotes_is_doubled() => Reads(Header + "\"aaa\",\"b\"\"bb\",\"ccc\"\r\n", ["aaa", "b\"bb", "ccc"]);

    private static void Reads(string text, params string[][] rows)
    {
        var bytes = Fixture.Utf8(text);
        var profile = Fixture.Profile(bytes);
        Assert.Equal(new CsvDialect("utf-8", false, ',', '.'), profile.Dialect);
        Assert.Equal(rows.Length, profile.Rows);
        Assert.Equal(rows, Fixture.Cells(bytes, profile));
    }
}
