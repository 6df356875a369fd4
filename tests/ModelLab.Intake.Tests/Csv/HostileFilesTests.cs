using System.Globalization;
using ModelLab.Intake.Csv;

namespace ModelLab.Intake.Tests.Csv;

public sealed class HostileFilesTests
{
    public static TheoryData<string> Names => [.. HostileFile.All.Select(f => f.Name)];

    [Theory]
    [MemberData(nameof(Names))]
    public void Is_refused_with_its_place_and_a_remedy(string name)
    {
        var file = HostileFile.All.Single(f => f.Name == name);

        var refused = Fixture.Refused(file.Bytes);

        Assert.Equal(file.Problems, refused.Problems.Count);
        Assert.Equal(file.Row, refused.Problems[0].Row);
        Assert.Equal(file.Column, refused.Problems[0].Column);
        Assert.Contains(file.Says, refused.Problems[0].Message, StringComparison.Ordinal);
        Assert.Contains(refused.Problems[0].Message, refused.Message, StringComparison.Ordinal);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Is_refused_alike_when_it_comes_byte_by_byte(string name)
    {
        var file = HostileFile.All.Single(f => f.Name == name);
        var refused = Fixture.Refused(file.Bytes);

        using var trickle = new TrickleStream(file.Bytes, file.Bytes.Length > 100_000 ? 4093 : 1);
        var again = Assert.Throws<IntakeRefusedException>(() => CsvTable.Profile(trickle, new CsvOptions(), TestContext.Current.CancellationToken));

        Assert.Equal(refused.Problems, again.Problems);
    }

    [Fact]
    public void At_most_a_hundred_problems_are_told()
    {
        var refused = Fixture.Refused(Fixture.Utf8("a,b\n" + string.Concat(Enumerable.Repeat("1\n", 500))));

        Assert.Equal(IntakeLimits.Problems, refused.Problems.Count);
        Assert.Equal(Enumerable.Range(1, 100).Select(i => (long?)i), refused.Problems.Select(p => p.Row));
        Assert.Contains("there may be more", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Messages_tell_places_but_no_texts_of_cells()
    {
        const string secret = "Zanzibar";
        foreach (var text in new[] { $"a,b\n{secret}\n", $"a,b\n\"{secret}\"x,1\n", $"a,b\n{secret}\"s,1\n", $"a,b\n1,\"{secret}\n", $"a,b\n{secret}\0,1" })
        {
            var refused = Fixture.Refused(Fixture.Utf8(text));
            Assert.DoesNotContain(secret, refused.Message, StringComparison.Ordinal);
            Assert.All(refused.Problems, p => Assert.DoesNotContain(secret, p.Message, StringComparison.Ordinal));
        }
    }

    [Theory]
    [InlineData("utf-7")]
    [InlineData("shift_jis")]
    public void An_encoding_that_is_not_read_is_refused(string encoding)
    {
        var refused = Fixture.Refused(Fixture.Utf8("a,b\n1,2\n"), new CsvOptions(Encoding: encoding));

        Assert.Contains(encoding, refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void A_delimiter_or_decimal_mark_that_is_not_known_is_an_error_of_the_caller()
    {
        Assert.Throws<ArgumentException>(() => Fixture.Profile("a,b\n1,2\n", new CsvOptions(Delimiter: ':')));
        Assert.Throws<ArgumentException>(() => Fixture.Profile("a,b\n1,2\n", new CsvOptions(DecimalMark: '\'')));
    }

    [Fact]
    public void Reading_stops_when_cancelled()
    {
        using var cancelled = new CancellationTokenSource();
        cancelled.Cancel();
        var bytes = Fixture.Utf8("a,b\n" + string.Concat(Enumerable.Range(0, 5000).Select(i => string.Create(CultureInfo.InvariantCulture, $"{i},x\n"))));

        Assert.Throws<OperationCanceledException>(() => CsvTable.Profile(new MemoryStream(bytes), new CsvOptions(), cancelled.Token));
        Assert.Throws<OperationCanceledException>(() => CsvTable.Read(new MemoryStream(bytes), new CsvDialect("utf-8", false, ',', '.'), [new("a", true, [])], cancelled.Token));
    }
}
