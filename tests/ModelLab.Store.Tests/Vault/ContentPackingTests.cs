using ModelLab.Store.Vault;

namespace ModelLab.Store.Tests.Vault;

public sealed class ContentPackingTests
{
    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(100_000)]
    public void Content_comes_back(int length)
    {
        var content = SourceVaultTests.Content(length);
        Assert.Equal(content, ContentPacking.Unpack(ContentPacking.Pack(content)));
    }

    [Fact]
    public void Repetition_becomes_smaller_and_noise_stays_as_it_is()
    {
        var noise = new byte[10_000];
        new Random(1).NextBytes(noise);
        Assert.True(ContentPacking.Pack(new byte[10_000]).Length < 100);
        Assert.Equal(10_005, ContentPacking.Pack(noise).Length);
    }

    [Fact]
    public void Cut_or_unknown_forms_are_refused()
    {
        var packed = ContentPacking.Pack(new byte[1000]);
        Assert.Throws<InvalidDataException>(() => ContentPacking.Unpack(packed.AsSpan(0, 4)));
        Assert.Throws<InvalidDataException>(() => ContentPacking.Unpack(packed.AsSpan(0, packed.Length - 1)));
        packed[0] = 9;
        Assert.Throws<InvalidDataException>(() => ContentPacking.Unpack(packed));
    }
}
