using Xunit;

namespace ModelLab.Ledger.Tests;

public class Sha256HashTests
{
    /// <summary>FIPS 180-4's example message "abc" (value as NIST publishes it with the standard's examples).</summary>
    [Fact]
    public void The_standards_example() => Assert.Equal(
        "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad", Sha256Hash.Of("abc"u8).ToString());

    [Fact]
    public void Text_and_bytes_lead_back()
    {
        var hash = Sha256Hash.Of("abc"u8);
        Assert.Equal(hash, Sha256Hash.Parse(hash.ToString()));
        Assert.Equal(hash, new Sha256Hash(hash.Bytes));
        Assert.True(hash == Sha256Hash.Parse(hash.ToString()));
        Assert.True(hash != Sha256Hash.Zero);
        Assert.Equal(new string('0', 64), Sha256Hash.Zero.ToString());
        Assert.Equal(default, new Sha256Hash(new byte[32]));
    }

    [Theory]
    [InlineData("")]
    [InlineData("ba7816bf")]
    [InlineData("BA7816BF8F01CFEA414140DE5DAE2223B00361A396177A9CB410FF61F20015AD")]
    [InlineData("xa7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad")]
    public void Other_texts_are_refused(string text) => Assert.Throws<FormatException>(() => Sha256Hash.Parse(text));

    [Fact]
    public void Other_lengths_are_refused() => Assert.Throws<ArgumentException>(() => new Sha256Hash(new byte[31]));
}
