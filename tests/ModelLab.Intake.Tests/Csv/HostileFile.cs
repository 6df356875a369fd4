using System.Text;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>A file that must be refused, and the place and words of its first problem.</summary>
/// <param name="Name">What is wrong with it.</param>
/// <param name="Bytes">The file.</param>
/// <param name="Row">Row of the first problem.</param>
/// <param name="Column">Column of the first problem.</param>
/// <param name="Says">Words of its message.</param>
/// <param name="Problems">How many problems are told.</param>
public sealed record HostileFile(string Name, byte[] Bytes, long? Row, string? Column, string Says, int Problems = 1)
{
    public static IReadOnlyList<HostileFile> All { get; } =
    [
        Of("nothing", "", null, null, "holds no text"),
        Of("only a byte order mark", [0xEF, 0xBB, 0xBF], null, null, "holds no text"),
        Of("only blank lines", "\n\r\n  \n", null, null, "holds no text"),
        Of("only a delimiter line", "sep=;\n", null, null, "nothing but the name of its delimiter"),
        Of("header without rows", "a,b\n", null, null, "no rows below"),
        Of("header without rows or line end", "a,b", null, null, "no rows below"),
        Of("header and blank lines", "a,b\n\n\n", null, null, "no rows below"),
        Of("only numbers in the header", "1,2\n3,4\n", 0, null, "no names"),
        Of("years as names", "2001;2002\n3;4\n", 0, null, "begin with a letter"),
        Of("numbers and missing texts in the header", "1,NA,-2.5\n3,4,5\n", 0, null, "no names"),
        Of("empty name", "a,,c\n1,2,3\n", 0, "2", "Column 2 has no name"),
        Of("blank name", "a,  ,c\n1,2,3\n", 0, "2", "Column 2 has no name"),
        Of("spare delimiter at the end of every row", "a,b,\n1,2,\n", 0, "3", "spare delimiter"),
        Of("nameless first column", ",a\n1,2\n", 0, "1", "Column 1 has no name"),
        Of("duplicate names", "a,b,a\n1,2,3\n", 0, "a", "Columns 1 and 3"),
        Of("duplicate names but for spaces", "a, a\n1,2\n", 0, "a", "Columns 1 and 2"),
        Of("two empty names and a duplicate", "a,,,a\n1,2,3,4\n", 0, "2", "no name", 3),
        Of("very long name", new string('n', 201) + ",b\n1,2\n", 0, "1", "longer than 200"),
        Of("short row", "a,b,c\n1,2,3\n4,5\n", 2, null, "2 cells where the header has 3"),
        Of("long row", "a,b\n1,2\n3,4,5\n6,7\n", 2, null, "3 cells where the header has 2"),
        Of("single cell in a row", "a,b\n1,2\nx\n", 2, null, "1 cell where"),
        Of("three ragged rows of five", "a,b\n1\n2,3\n4\n5,6\n7,8,9\n", 1, null, "1 cell where", 3),
        Of("blank line within", "a,b\n1,2\n\n3,4\n", 2, null, "line is blank"),
        Of("two blank lines within", "a,b\n1,2\n\n \n3,4\n", 2, null, "line is blank", 2),
        Of("rows wider than the header", "a\n1,2\n3,4\n", 1, null, "2 cells where the header has 1", 2),
        Of("unquoted delimiter in a text", "name,n\nx, y,1\nz,2\nq,3\n", 1, null, "enclosed in quotes"),
        Of("quote never closed", "a,b\n1,2\n3,\"4\n5,6\n7,8\n", 2, "b", "never closed"),
        Of("quote never closed in the first cell", "a,b\n\"1,2\n3,4\n", 1, "a", "never closed"),
        Of("quote never closed at the end", "a,b\n1,2\n3,\"", 2, "b", "never closed"),
        Of("quote never closed in the header", "a,\"b\n1,2\n", 0, "2", "never closed"),
        Of("text after a closing quote", "a,b\n\"1\"x,2\n", 1, "a", "closing quote"),
        Of("space after a closing quote", "a,b\n1,\"2\" \n", 1, "b", "closing quote"),
        Of("space before an opening quote", "a,b\n1, \"2\"\n", 1, "b", "not enclosed in quotes"),
        Of("inches", "a,b\n5\" pipe,2\n", 1, "a", "not enclosed in quotes"),
        Of("quote within the header", "a\"x,b\n1,2\n", 0, "1", "not enclosed in quotes"),
        Of("two rows of bad quotes", "a,b\n\"1\"x,2\n3,4\n5,6\"\n", 1, "a", "closing quote", 2),
        Of("quote closed rows later", "a,b\n\"1,2\n3,4\n5\",x\"\n6,7\n", 1, "b", "not enclosed"),
        Of("NUL byte in a cell", "a,b\n1,2\n3,\0\n", 2, "b", "NUL byte"),
        Of("NUL byte in the header", "a,b\0\n1,2\n", 0, "2", "NUL byte"),
        Of("NUL byte after a row", "a,b\n1,2\n\0", 2, "a", "NUL byte"),
        Of("NUL byte first", "\0a,b\n1,2\n", 0, null, "NUL byte"),
        Of("UTF-16 little endian", [.. Encoding.Unicode.Preamble, .. Encoding.Unicode.GetBytes("a,b\n1,2\n")], null, null, "UTF-16"),
        Of("UTF-16 big endian", [.. Encoding.BigEndianUnicode.Preamble, .. Encoding.BigEndianUnicode.GetBytes("a,b\n1,2\n")], null, null, "UTF-16"),
        Of("UTF-16 without mark", Encoding.Unicode.GetBytes("a,b\n1,2\n"), 0, "1", "NUL byte"),
        Of("UTF-32", [.. Encoding.UTF32.Preamble, .. Encoding.UTF32.GetBytes("a,b\n1,2\n")], null, null, "UTF-32"),
        Of("valid UTF-8, then a stray byte", [.. Encoding.UTF8.GetBytes("a,b\né,2\n3,x"), 0xFF, (byte)'\n'], 2, "b", "not valid UTF-8"),
        Of("UTF-8 cut off within a character", [.. Encoding.UTF8.GetBytes("a,b\né,2\n3,"), 0xE2, 0x82], 2, "b", "not valid UTF-8"),
        Of("overlong UTF-8 after valid", [.. Encoding.UTF8.GetBytes("a,b\né,2\n"), 0xC0, 0xAF, (byte)',', (byte)'1'], 2, "a", "not valid UTF-8"),
        Of("byte order mark of UTF-8, then none", [0xEF, 0xBB, 0xBF, .. "a,b\n1,"u8, 0xE9, (byte)'\n'], 1, "b", "not valid UTF-8"),
        Of("a byte that Windows-1252 does not know", [.. "a,b\n1,"u8, 0x81, (byte)'\n'], 1, "b", "81"),
        Of("Windows-1252, then an unknown byte rows later", [.. "a,b\n1,"u8, 0xE9, .. "\n2,3\n4,"u8, 0x9D], 3, "b", "9D"),
        Of("workbook", [.. "PK\u0003\u0004"u8, 20, 0, 6, 0], null, null, "workbook"),
        Of("empty ZIP archive", [.. "PK\u0005\u0006"u8, .. new byte[18]], null, null, "ZIP"),
        Of("old workbook", [0xD0, 0xCF, 0x11, 0xE0, 0xA1, 0xB1, 0x1A, 0xE1], null, null, "old binary workbook"),
        Of("gzip", [0x1F, 0x8B, 0x08, 0x00], null, null, "compressed"),
        Of("PDF", "%PDF-1.7\n1 0 obj\n", null, null, "PDF"),
        Of("PNG", [0x89, 0x50, 0x4E, 0x47, 0x0D, 0x0A, 0x1A, 0x0A], null, null, "picture"),
        Of("JPEG", [0xFF, 0xD8, 0xFF, 0xE0], null, null, "picture"),
        Of("GIF", "GIF89a....", null, null, "picture"),
        Of("Parquet", "PAR1....", null, null, "Parquet"),
        Of("web page", "<!DOCTYPE html><html>", null, null, "web page"),
        Of("XML with mark", [0xEF, 0xBB, 0xBF, .. "<?xml version=\"1.0\"?>"u8], null, null, "XML"),
        Of("too many columns", string.Join(',', Enumerable.Range(0, 5001).Select(i => $"c{i}")) + "\n", 0, null, "at most 5000"),
        Of("cell too long", "a,b\n1," + new string('x', 65_537) + "\n2,3\n", 1, "b", "at most 65536"),
        Of("row too long", "a,b\n1,\"" + new string('x', 10 << 20) + "\"\n2,3\n", 1, null, "longer than 4 MiB"),
        Of("quote never closed in a large file", "a,b\n1,2\n3,\"4\n" + string.Concat(Enumerable.Repeat("5,6\n", 3_000_000)), 2, null, "never closed"),
        Of("thousands marks in a quoted cell", "a,b\n1,\"1,234\"\n2,5\n", 1, "b", "thousands mark"),
        Of("thousands marks and decimals", "a;b\n1;1.234,5\n2;5\n", 1, "b", "thousands marks"),
        Of("thousands marks twice", "a;b\n1;5\n2;1.234.567\n", 2, "b", "thousands marks"),
        Of("thousands set off by spaces", "a,b\n1,5\n2,12 345\n", 2, "b", "thousands marks"),
        Of("thousands set off by no-break spaces", "a,b\n1,5\n2,12\u00A0345\n", 2, "b", "thousands marks"),
        Of("thousands set off by apostrophes", "a,b\n1,5\n2,12'345\n", 2, "b", "thousands marks"),
        Of("points before three digits beside decimal commas", "a;b;c\n1;1.234;1,5\n2;2.500;2,5\n3;7;3,25\n", 1, "b", "thousands mark"),
        Of("both decimal marks in one column", "a;b\n1;1.5\n2;2,5\n3;7,25\n", 2, "b", "Write all decimals with one mark"),
    ];

    public override string ToString() => Name;

    private static HostileFile Of(string name, string text, long? row, string? column, string says, int problems = 1) =>
        new(name, Fixture.Utf8(text), row, column, says, problems);

    private static HostileFile Of(string name, byte[] bytes, long? row, string? column, string says, int problems = 1) =>
        new(name, bytes, row, column, says, problems);
}
