using ModelLab.Ledger.Entries;
using Xunit;

namespace ModelLab.Ledger.Tests.Entries;

public class EntryKindTests
{
    [Theory]
    [InlineData("revision/1", "revision", 1)]
    [InlineData("data-decision/12", "data-decision", 12)]
    [InlineData("a/2147483647", "a", int.MaxValue)]
    [InlineData("sign-off-2nd-try/3", null, 0)]
    [InlineData("step2/1", "step2", 1)]
    [InlineData("", null, 0)]
    [InlineData("/", null, 0)]
    [InlineData("/1", null, 0)]
    [InlineData("revision", null, 0)]
    [InlineData("revision/", null, 0)]
    [InlineData("revision/0", null, 0)]
    [InlineData("revision/01", null, 0)]
    [InlineData("revision/-1", null, 0)]
    [InlineData("revision/+1", null, 0)]
    [InlineData("revision/1.0", null, 0)]
    [InlineData("revision/ 1", null, 0)]
    [InlineData("revision/1 ", null, 0)]
    [InlineData("revision/1/1", null, 0)]
    [InlineData("revision/\u0661", null, 0)]
    [InlineData("revision/2147483648", null, 0)]
    [InlineData("Revision/1", null, 0)]
    [InlineData("r\u00e9vision/1", null, 0)]
    [InlineData("data_decision/1", null, 0)]
    [InlineData("data decision/1", null, 0)]
    [InlineData("-decision/1", null, 0)]
    [InlineData("data-/1", null, 0)]
    [InlineData("data--decision/1", null, 0)]
    [InlineData("2data/1", null, 0)]
    public void A_kind_is_lower_case_words_joined_by_hyphens_a_slash_and_a_version(string text, string? name, int version)
    {
        Assert.Equal(name is not null, EntryKind.TryParse(text, out var kind));
        if (name is null)
        {
            Assert.Throws<FormatException>(() => EntryKind.Parse(text));
            return;
        }

        Assert.Equal(new EntryKind(name, version), kind);
        Assert.Equal(text, kind!.ToString());
    }

    [Fact]
    public void Names_are_limited_in_length()
    {
        Assert.True(EntryKind.IsName(new string('a', EntryKind.MaximumNameLength)));
        Assert.False(EntryKind.IsName(new string('a', EntryKind.MaximumNameLength + 1)));
    }
}
