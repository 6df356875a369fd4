using System.Text;
using System.Text.Json.Nodes;
using CsCheck;
using ModelLab.Ledger.Canonical;
using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Verification;
using Xunit;

namespace ModelLab.Ledger.Tests.Entries;

public class LedgerEntryTests
{
    private const string Good =
        """{"at":"2026-03-01T09:30:00.000000Z","body":{},"by":{"name":"Ada","personId":"p"},"kind":"revision/1","ledger":"x","number":1,"previous":"0000000000000000000000000000000000000000000000000000000000000000","reason":"r","sealed":{"commitment":"1111111111111111111111111111111111111111111111111111111111111111","sourceId":"s"}}""";

    [Fact]
    public void An_entry_is_read_as_it_was_drafted()
    {
        foreach (var (draft, entry) in SmallLedger.Drafts().Zip(SmallLedger.Batch.Entries))
        {
            var read = LedgerEntry.Parse(entry.CanonicalBytes);
            Assert.Equal(draft.Kind, read.Kind);
            Assert.Equal(draft.By, read.By);
            Assert.Equal(draft.Reason, read.Reason);
            Assert.Equal(draft.At, read.At);
            Assert.True(JsonNode.DeepEquals(draft.Body, read.Body));
            Assert.Equal(draft.Sealed is null, read.Sealed is null);
            Assert.True(draft.Sealed is null || SealedCommitment.Matches(read.Sealed!, draft.Sealed));
            Assert.Equal(entry, read);
        }
    }

    /// <summary>The order of members is written out in the code; the general serialiser must agree with it.</summary>
    [Fact]
    public void The_bytes_of_an_entry_are_canonical_as_a_whole()
    {
        foreach (var entry in SmallLedger.Batch.Entries)
        {
            CanonicalJson.Check(entry.CanonicalBytes.Span);
            Assert.Equal(entry.CanonicalBytes.ToArray(), CanonicalJson.Serialise(JsonNode.Parse(entry.CanonicalBytes.Span)));
        }
    }

    [Fact]
    public void A_well_formed_entry_of_a_kind_nobody_knows_is_read() =>
        Assert.Equal("never-heard-of/7", LedgerEntry.Parse(Encoding.UTF8.GetBytes(Good.Replace("revision/1", "never-heard-of/7", StringComparison.Ordinal))).Kind);

    [Theory]
    [InlineData("\"at\":\"2026-03-01T09:30:00.000000Z\"", "\"at\":\"2026-03-01T09:30:00Z\"")]
    [InlineData("\"at\":\"2026-03-01T09:30:00.000000Z\"", "\"at\":\"2026-03-01T09:30:00.0000000Z\"")]
    [InlineData("\"at\":\"2026-03-01T09:30:00.000000Z\"", "\"at\":\"2026-03-01t09:30:00.000000z\"")]
    [InlineData("\"at\":\"2026-03-01T09:30:00.000000Z\"", "\"at\":\"2026-03-01T09:30:00.000000+00:00\"")]
    [InlineData("\"at\":\"2026-03-01T09:30:00.000000Z\"", "\"at\":\"2026-02-29T09:30:00.000000Z\"")]
    [InlineData("\"at\":\"2026-03-01T09:30:00.000000Z\"", "\"at\":\"2026-03-01T24:00:00.000000Z\"")]
    [InlineData("\"at\":\"2026-03-01T09:30:00.000000Z\"", "\"at\":\"2026-03-01T09:30:60.000000Z\"")]
    [InlineData("\"at\":\"2026-03-01T09:30:00.000000Z\"", "\"at\":null")]
    [InlineData("\"body\":{}", "\"body\":[]")]
    [InlineData("\"body\":{}", "\"body\":null")]
    [InlineData("\"body\":{},", "")]
    [InlineData("\"body\":{}", "\"body\":{\"a\":1,\"a\":2}")]
    [InlineData("\"body\":{}", "\"body\":{\"b\":1,\"a\":2}")]
    [InlineData("\"body\":{}", "\"body\":{\"a\":1.0}")]
    [InlineData("\"name\":\"Ada\"", "\"name\":\"\"")]
    [InlineData("\"name\":\"Ada\"", "\"name\":\"\\t\"")]
    [InlineData("\"name\":\"Ada\"", "\"name\":1")]
    [InlineData("\"personId\":\"p\"", "\"personId\":\" \"")]
    [InlineData("\"kind\":\"revision/1\"", "\"kind\":\"revision\"")]
    [InlineData("\"kind\":\"revision/1\"", "\"kind\":\"Revision/1\"")]
    [InlineData("\"ledger\":\"x\"", "\"ledger\":\"\"")]
    [InlineData("\"number\":1", "\"number\":0")]
    [InlineData("\"number\":1", "\"number\":-1")]
    [InlineData("\"number\":1", "\"number\":1.5")]
    [InlineData("\"number\":1", "\"number\":1e+21")]
    [InlineData("\"number\":1", "\"number\":9007199254740992")]
    [InlineData("\"number\":1", "\"number\":\"1\"")]
    [InlineData("\"previous\":\"00", "\"previous\":\"0")]
    [InlineData("\"previous\":\"00", "\"previous\":\"000")]
    [InlineData("\"previous\":\"00", "\"previous\":\"0A")]
    [InlineData("\"reason\":\"r\"", "\"reason\":null")]
    [InlineData("\"reason\":\"r\"", "\"reason\":\"\"")]
    [InlineData("\"reason\":\"r\"", "\"reason\":\" \"")]
    [InlineData("\"sourceId\":\"s\"", "\"sourceId\":\"\"")]
    [InlineData("\"sourceId\":\"s\"", "\"sourceId\":\"s\",\"z\":1")]
    [InlineData("\"commitment\":\"11", "\"commitment\":\"1")]
    [InlineData("}}", "},\"z\":1}")]
    [InlineData("}}", "}} ")]
    [InlineData("}}", "}")]
    public void What_is_no_entry_is_refused(string part, string replacement)
    {
        Assert.Equal("revision/1", LedgerEntry.Parse(Encoding.UTF8.GetBytes(Good)).Kind);
        var bad = Good.Replace(part, replacement, StringComparison.Ordinal);
        Assert.NotEqual(Good, bad);
        Assert.ThrowsAny<FormatException>(() => LedgerEntry.Parse(Encoding.UTF8.GetBytes(bad)));
    }

    [Fact]
    public void Random_entries_are_appended_read_back_and_verified() =>
        FixedSamples.Check(Gen.Select(RandomJson.Object, RandomJson.Text, RandomJson.Object).Array[1, 5], 400, acts =>
        {
            EntryDraft[] drafts =
            [
                .. acts.Select(a => new EntryDraft(
                    "act/1", DateTimeOffset.UnixEpoch, new Author("p", "Ada" + a.Item2), a.Item2 + ".", a.Item1,
                    a.Item3.Count == 0 ? null : new SealedContent("s", new byte[32], a.Item3))),
            ];
            var batch = LedgerAppender.Append(LedgerHead.Empty("x"), drafts);
            var verifier = new LedgerVerifier("x");
            foreach (var (draft, entry) in drafts.Zip(batch.Entries))
            {
                Assert.Equal(draft.Reason, entry.Reason);
                Assert.Equal(CanonicalJson.Serialise(draft.Body), CanonicalJson.Serialise(entry.Body));
                verifier.Add(entry.CanonicalBytes);
            }

            var result = verifier.Finish(batch.Head);
            Assert.True(result.Ok, result.Problem);
        });
}
