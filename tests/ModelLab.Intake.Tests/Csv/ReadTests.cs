using ModelLab.Intake.Csv;
using ModelLab.Statistics.Designs;

namespace ModelLab.Intake.Tests.Csv;

public sealed class ReadTests
{
    private static readonly CsvDialect Comma = new("utf-8", false, ',', '.');

    [Fact]
    public void Columns_come_in_the_order_asked_and_no_others()
    {
        var table = Read("a,b,c\n1,x,2\n3,y,4\n", Comma, new("c", true, []), new("b", false, []));

        Assert.Equal(["c", "b"], table.Columns.Select(c => c.Name));
        Assert.Equal([2, 4], ((NumberColumn)table.Columns[0]).Values.ToArray());
        Assert.Equal(["x", "y"], ((CategoryColumn)table.Columns[1]).Categories);
    }

    [Fact]
    public void Numbers_are_taken_as_written()
    {
        // 0.1 = 0x1.999999999999ap-4 − 5.551115123125783e-18 (IEEE 754 binary64)
        var column = (NumberColumn)Read("a,b\n0.5,1\n0.1,1\n,1\n-0.1,1\n", Comma, new ColumnRequest("a", true, [])).Columns[0];

        Assert.Equal([0.5, 0.1, double.NaN, -0.1], column.Values.ToArray());
        Assert.Equal([0, -5.551115123125783e-18, 0, 5.551115123125783e-18], column.Remainders.ToArray());
        Assert.True(column.IsMissing(2));
    }

    [Fact]
    public void Remainders_are_absent_where_every_number_is_exact() =>
        Assert.True(((NumberColumn)Read("a,b\n0.5,1\n-3,1\n1e3,1\n", Comma, new ColumnRequest("a", true, [])).Columns[0]).Remainders.IsEmpty);

    [Theory]
    [InlineData(".5", 0.5)]
    [InlineData("5.", 5)]
    [InlineData("-.5", -0.5)]
    [InlineData("+5", 5)]
    [InlineData("5.e2", 500)]
    [InlineData("1E-2", 0.01)]
    [InlineData("  7 ", 7)]
    [InlineData("\u00A07", 7)]
    [InlineData("007", 7)]
    public void Usual_ways_of_writing_a_number_are_read(string cell, double value) =>
        Assert.Equal(value, ((NumberColumn)Read($"a,b\n{cell},1\n", Comma, new ColumnRequest("a", true, [])).Columns[0]).Values[0]);

    [Theory]
    [InlineData("1..5")]
    [InlineData("5.5.")]
    [InlineData(".")]
    [InlineData("1,5")]
    [InlineData("1 5")]
    [InlineData("NaN")]
    [InlineData("Infinity")]
    [InlineData("1e999")]
    [InlineData("x")]
    [InlineData("٣")]
    public void What_is_no_number_is_refused_with_row_and_column(string cell)
    {
        var refused = Assert.Throws<IntakeRefusedException>(() => Read($"a,b\n1,1\n\"{cell}\",1\n", Comma, new ColumnRequest("a", true, [])));

        var problem = Assert.Single(refused.Problems);
        Assert.Equal(2, problem.Row);
        Assert.Equal("a", problem.Column);
        Assert.Contains("missing code", problem.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Named_missing_codes_are_missing_as_texts_and_as_numbers()
    {
        var table = Read(
            "a,b\n-99,-99\n-99.0,-99.0\nNA,NA\n1, NA \n ,x\n",
            Comma,
            new("a", true, ["-99", "NA"]),
            new("b", false, ["-99", "NA"]));

        Assert.Equal([double.NaN, double.NaN, double.NaN, 1, double.NaN], ((NumberColumn)table.Columns[0]).Values.ToArray());
        var categories = (CategoryColumn)table.Columns[1];
        Assert.Equal(["-99.0", "x"], categories.Categories);
        Assert.Equal([-1, 0, -1, -1, 1], categories.Codes.ToArray());
    }

    [Fact]
    public void Categories_met_are_put_in_ordinal_order()
    {
        var column = (CategoryColumn)Read("a,b\nb,1\nB,1\na,1\nä,1\nb,1\n", Comma, new ColumnRequest("a", false, [], Reference: "a")).Columns[0];

        Assert.Equal(["B", "a", "b", "ä"], column.Categories);
        Assert.Equal([2, 0, 1, 3, 2], column.Codes.ToArray());
        Assert.Equal(1, column.Reference);
    }

    [Fact]
    public void Numbers_that_stand_for_categories_are_taken_without_spaces_and_texts_with_them()
    {
        var column = (CategoryColumn)Read("a,b\n 1,1\n1 ,1\n a,1\na,1\n", Comma, new ColumnRequest("a", false, [])).Columns[0];

        Assert.Equal([" a", "1", "a"], column.Categories);
        Assert.Equal([1, 1, 0, 2], column.Codes.ToArray());
    }

    [Fact]
    public void Listed_categories_keep_their_order_and_others_are_refused()
    {
        var request = new ColumnRequest("a", false, [], ["low", "high", "never met"], "high");
        var column = (CategoryColumn)Read("a,b\nhigh,1\nlow,1\n", Comma, request).Columns[0];

        Assert.Equal(["low", "high", "never met"], column.Categories);
        Assert.Equal([1, 0], column.Codes.ToArray());
        Assert.Equal(1, column.Reference);

        var refused = Assert.Throws<IntakeRefusedException>(() => Read("a,b\nhigh,1\nHigh,1\nlow,1\n,1\n low,1\n", Comma, request));
        Assert.Equal([2, 5], refused.Problems.Select(p => p.Row!.Value));
    }

    [Fact]
    public void A_column_or_reference_that_is_not_there_is_refused_and_a_double_request_is_the_callers_error()
    {
        var refused = Assert.Throws<IntakeRefusedException>(() => Read("a,b\n1,2\n", Comma, new("c", true, []), new("d", true, [])));
        Assert.Equal(["c", "d"], refused.Problems.Select(p => p.Column));

        refused = Assert.Throws<IntakeRefusedException>(() => Read("a,b\n1,2\n", Comma, new ColumnRequest("a", false, [], Reference: "9")));
        Assert.Equal("a", Assert.Single(refused.Problems).Column);

        Assert.Throws<ArgumentException>(() => Read("a,b\n1,2\n", Comma, new("a", true, []), new("a", false, [])));
        Assert.Throws<ArgumentException>(() => Read("a,b\n1,2\n", Comma, new ColumnRequest("a", false, [], ["x", "x"])));
    }

    [Fact]
    public void Ragged_rows_are_refused_on_reading_too()
    {
        var refused = Assert.Throws<IntakeRefusedException>(() => Read("a,b\n1,2\n3\n", Comma, new ColumnRequest("a", true, [])));

        Assert.Equal(2, Assert.Single(refused.Problems).Row);
    }

    [Fact]
    public void More_rows_than_one_chunk_are_kept_in_order()
    {
        var table = Read("a,b\n" + string.Concat(Enumerable.Range(0, 50_000).Select(i => $"{i}.1,c{i % 7}\n")), Comma, new("a", true, []), new("b", false, []));

        Assert.Equal(50_000, table.Rows);
        Assert.Equal(49_999.1, ((NumberColumn)table.Columns[0]).Values[49_999]);
        Assert.Equal(49_999 % 7, ((CategoryColumn)table.Columns[1]).Codes[49_999]);
        Assert.Equal(50_000, ((NumberColumn)table.Columns[0]).Remainders.Length);
    }

    private static DataTable Read(string text, CsvDialect dialect, params ColumnRequest[] columns) =>
        CsvTable.Read(new MemoryStream(Fixture.Utf8(text)), dialect, columns);
}
