using System.Security.Cryptography;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;
using Xunit;

namespace ModelLab.Ledger.Tests.Entries;

public class SealedCommitmentTests
{
    private static readonly byte[] Salt = [.. Enumerable.Range(0, 32).Select(i => (byte)i)];

    private static readonly SealedContent Content = new("s-1", Salt, JsonNode.Parse("""{"b":[1.0,"ä"],"a":null}""")!.AsObject());

    private static readonly SealedReference Reference = new("s-1", SealedCommitment.Of(Salt, Content.Content));

    [Fact]
    public void The_commitment_is_the_hash_of_tag_salt_and_canonical_content() => Assert.Equal(
        SHA256.HashData([0x02, .. Salt, .. "{\"a\":null,\"b\":[1,\"ä\"]}"u8]),
        Reference.Commitment.Bytes.ToArray());

    [Fact]
    public void What_was_sealed_is_recognised_however_it_is_spelled()
    {
        Assert.True(SealedCommitment.Matches(Reference, Content));
        Assert.True(SealedCommitment.Matches(Reference, Content with { Content = JsonNode.Parse("""{"a":null,"b":[1e0,"\u00e4"]}""")!.AsObject() }));
    }

    [Fact]
    public void Any_other_salt_content_or_source_is_found()
    {
        for (var place = 0; place < Salt.Length; place++)
        {
            var salt = (byte[])Salt.Clone();
            salt[place] ^= 1;
            Assert.False(SealedCommitment.Matches(Reference, Content with { Salt = salt }));
        }

        Assert.False(SealedCommitment.Matches(Reference, Content with { Salt = Salt[..31] }));
        Assert.False(SealedCommitment.Matches(Reference, Content with { Content = JsonNode.Parse("""{"a":null,"b":[1,"a"]}""")!.AsObject() }));
        Assert.False(SealedCommitment.Matches(Reference, Content with { Content = [] }));
        Assert.False(SealedCommitment.Matches(Reference, Content with { SourceId = "s-2" }));
    }

    [Fact]
    public void A_salt_of_another_length_is_refused()
    {
        Assert.Throws<ArgumentException>(() => SealedCommitment.Of(new byte[31], []));
        Assert.Throws<ArgumentException>(() => SealedCommitment.Of(new byte[33], []));
    }
}
