using Xunit;

namespace ModelLab.Ledger.Tests;

public class LedgerTimeTests
{
    [Theory]
    [InlineData("0001-01-01T00:00:00.000000Z")]
    [InlineData("2024-02-29T23:59:59.999999Z")]
    [InlineData("9999-12-31T23:59:59.999999Z")]
    public void Times_have_one_form(string text) => Assert.Equal(text, LedgerTime.Text(LedgerTime.Parse(text)));

    [Fact]
    public void Other_offsets_are_turned_to_UTC_and_what_lies_below_a_microsecond_is_dropped() => Assert.Equal(
        "2026-03-01T07:30:00.123456Z",
        LedgerTime.Text(new DateTimeOffset(2026, 3, 1, 9, 30, 0, TimeSpan.FromHours(2)).AddTicks(1_234_569)));

    [Fact]
    public void Texts_sort_as_the_times_do()
    {
        var times = Enumerable.Range(0, 50).Select(i => DateTimeOffset.UnixEpoch.AddTicks(i * 86_400_123_450L * 97)).ToList();
        Assert.Equal(times.Select(LedgerTime.Text), times.Select(LedgerTime.Text).Reverse().Order(StringComparer.Ordinal));
    }

    [Theory]
    [InlineData("")]
    [InlineData("2026-03-01")]
    [InlineData("2026-03-01 09:30:00.000000Z")]
    [InlineData("2026-03-01T09:30:00.000Z")]
    [InlineData("2026-03-01T09:30:00.000000")]
    [InlineData(" 2026-03-01T09:30:00.000000Z")]
    [InlineData("2026-13-01T09:30:00.000000Z")]
    public void Other_forms_are_refused(string text) => Assert.Throws<FormatException>(() => LedgerTime.Parse(text));
}
