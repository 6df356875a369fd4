using System.Text;
using ModelLab.Intake.Csv;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>Files that look odd but say clearly what they mean. Cells are shown with '|' between and ∅ where missing; quotes do not matter any more.</summary>
public sealed class OddFilesTests
{
    [Theory]
    [InlineData("carriage returns alone", "a,b\r1,2\r3,4\r", ',', '.', "1|2/3|4")]
    [InlineData("carriage return and line feed", "a,b\r\n1,2\r\n3,4", ',', '.', "1|2/3|4")]
    [InlineData("mixed line ends", "a,b\r\n1,2\n3,4\r5,6", ',', '.', "1|2/3|4/5|6")]
    [InlineData("blank lines before and behind", "\n \r\na,b\n1,2\n\n  \n\n", ',', '.', "1|2")]
    [InlineData("blank lines in one column are missing", "a\nx\n\ny\n\n\n", ',', '.', "x/∅/y")]
    [InlineData("quoted empty cell at the end of one column", "a\nx\n\"\"\n", ',', '.', "x/∅")]
    [InlineData("one column of texts with semicolons", "a\nx;y\nz\n", ',', '.', "x;y/z")]
    [InlineData("one column of whole numbers", "a\n1\n2\n", ',', '.', "1/2")]
    [InlineData("tab", "a\tb\nx, y\t2\n", '\t', '.', "x, y|2")]
    [InlineData("vertical bar", "a|b\nx,y;z|2\n", '|', '.', "x,y;z|2")]
    [InlineData("semicolons with decimal commas", "a;b\n1,5;2,25\n3,5;4\n", ';', ',', "1,5|2,25/3,5|4")]
    [InlineData("semicolons with decimal points", "a;b\n1.5;2.25\n", ';', '.', "1.5|2.25")]
    [InlineData("tabs with decimal commas", "a\tb\n1,5\t2\n", '\t', ',', "1,5|2")]
    [InlineData("commas with quoted decimal commas", "a,b\n\"1,5\",x\n\"2,75\",y\n", ',', ',', "1,5|x/2,75|y")]
    [InlineData("commas in text, tabs between", "a\tb\tc\nx,y,z\t1\t2\nx,y,z\t3\t4\n", '\t', '.', "x,y,z|1|2/x,y,z|3|4")]
    [InlineData("delimiters in quotes do not count", "a,b\n\"x;y;z\",2\n\"p;q;r\",3\n", ',', '.', "x;y;z|2/p;q;r|3")]
    [InlineData("line breaks in quotes", "a,b\n\"x\ny\r\nz\",2\n", ',', '.', "x\ny\r\nz|2")]
    [InlineData("doubled quotes", "a,b\n\"say \"\"no\"\"\",\"\"\"\"\n", ',', '.', "say \"no\"|\"")]
    [InlineData("name of the delimiter in the first line", "sep=;\na;b\n1;2\n", ';', '.', "1|2")]
    [InlineData("name of the delimiter, in capitals and against the look of the rows", "SEP=,\na;x,b\n1;2,3\n", ',', '.', "1;2|3")]
    [InlineData("cells that begin like comments or formulas", "a,b\n#1,=2+3\n", ',', '.', "#1|=2+3")]
    [InlineData("a row of delimiters is a row of missing cells", "a,b\n1,2\n,\n", ',', '.', "1|2/∅|∅")]
    [InlineData("spaces alone are missing", "a,b\n1,  \n2,x\n", ',', '.', "1|∅/2|x")]
    [InlineData("byte order mark", "\uFEFFa,b\n1,2\n", ',', '.', "1|2")]
    [InlineData("byte order mark before a quote", "\uFEFF\"a\",b\n1,2\n", ',', '.', "1|2")]
    [InlineData("other scripts", "α;β\nёж;日本\n", ';', '.', "ёж|日本")]
    [InlineData("characters beyond the basic plane", "a,b\n😀,𝒳\n", ',', '.', "😀|𝒳")]
    public void Is_read_as_meant(string name, string text, char delimiter, char decimalMark, string cells)
    {
        Assert.NotEmpty(name);
        var bytes = Fixture.Utf8(text);
        var profile = Fixture.Profile(bytes);

        Assert.Equal(new CsvDialect("utf-8", text[0] == '\uFEFF', delimiter, decimalMark), profile.Dialect);
        Assert.Equal(cells, string.Join('/', Fixture.Cells(bytes, profile).Select(row => string.Join('|', row.Select(c => c ?? "∅")))));
    }

    [Theory]
    [InlineData(" a , b ", "a", "b")]
    [InlineData("\" a\",\"b c\"", "a", "b c")]
    [InlineData("\"a\nb\",\"c\r\n\td\"", "a b", "c d")]
    [InlineData("2001,b", "2001", "b")]
    [InlineData("a,A", "a", "A")]
    [InlineData("\"a,1\",\"b\"\"2\"", "a,1", "b\"2")]
    public void Names_are_trimmed_and_kept(string header, string first, string second) =>
        Assert.Equal([first, second], Fixture.Profile(header + "\n1,2\n").Columns.Select(c => c.Name));

    [Fact]
    public void Windows_1252_is_read_with_all_its_characters()
    {
        // the 123 characters of 80 to FF, from the published table of Windows-1252 (WHATWG Encoding, index windows-1252; its five C1 controls left out)
        const string upper = "€‚ƒ„…†‡ˆ‰Š‹ŒŽ‘’“”•–—˜™š›œžŸ\u00A0¡¢£¤¥¦§¨©ª«¬\u00AD®¯°±²³´µ¶·¸¹º»¼½¾¿ÀÁÂÃÄÅÆÇÈÉÊËÌÍÎÏÐÑÒÓÔÕÖ×ØÙÚÛÜÝÞßàáâãäåæçèéêëìíîïðñòóôõö÷øùúûüýþÿ";
        byte[] undefined = [0x81, 0x8D, 0x8F, 0x90, 0x9D];
        byte[] bytes = [.. "a,b\nx"u8, .. Enumerable.Range(0x80, 0x80).Select(i => (byte)i).Except(undefined), .. "x,1\n"u8];

        var profile = Fixture.Profile(bytes);

        Assert.Equal("windows-1252", profile.Dialect.Encoding);
        Assert.Equal("x" + upper + "x", Fixture.Cells(bytes, profile)[0][0]);
    }

    [Fact]
    public void Windows_1252_is_found_far_behind_the_first_mebibyte_in_a_stream_that_cannot_seek()
    {
        byte[] bytes = [.. Encoding.ASCII.GetBytes("a,b\n" + string.Concat(Enumerable.Repeat("some text,1\n", 300_000))), .. "caf"u8, 0xE9, .. ",2\n"u8];
        Assert.True(bytes.Length > 3 << 20);

        using var stream = new TrickleStream(bytes, 70_001);
        var profile = CsvTable.Profile(stream, new CsvOptions(), TestContext.Current.CancellationToken);

        Assert.Equal("windows-1252", profile.Dialect.Encoding);
        Assert.Equal([new("café", 1), new("some text", 300_000)], profile.Columns[0].Values);
        Assert.Equal("café", Fixture.Cells(bytes, profile)[^1][0]);
    }

    [Fact]
    public void A_stated_encoding_is_taken_at_its_word()
    {
        byte[] bytes = [.. "a,b\n"u8, 0xC3, 0xA9, .. ",1\n"u8];

        Assert.Equal("é", Fixture.Profile(bytes).Columns[0].Values[0].Value);
        Assert.Equal("Ã©", Fixture.Profile(bytes, new CsvOptions(Encoding: "windows-1252")).Columns[0].Values[0].Value);
        Assert.Throws<IntakeRefusedException>(() => Fixture.Profile([.. "a,b\n"u8, 0xE9, .. ",1\n"u8], new CsvOptions(Encoding: "UTF-8")));
    }

    [Fact]
    public void A_stated_delimiter_is_taken_at_its_word() =>
        Assert.Equal(["a;b"], Fixture.Profile("a;b\n1;2\n3;4\n", new CsvOptions(Delimiter: ',')).Columns.Select(c => c.Name));

    [Fact]
    public void The_stream_is_left_open_and_the_opened_one_closed()
    {
        using var given = new MemoryStream("a,b\n1,2\n"u8.ToArray());
        CsvTable.Profile(given, new CsvOptions(), TestContext.Current.CancellationToken);
        Assert.True(given.CanRead);

        var opened = new MemoryStream("a,b\n1,2\n"u8.ToArray());
        CsvTable.Profile(() => opened, new CsvOptions(), TestContext.Current.CancellationToken);
        Assert.False(opened.CanRead);
    }

    [Fact]
    public void Five_thousand_columns_are_read()
    {
        var profile = Fixture.Profile(string.Join(',', Enumerable.Range(1, 5000).Select(i => $"c{i}")) + "\n" + string.Join(',', Enumerable.Range(1, 5000)) + "\n");

        Assert.Equal(5000, profile.Columns.Count);
        Assert.Equal(5000, profile.Columns[4999].Maximum);
    }
}
