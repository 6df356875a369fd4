using System.Security.Cryptography;
using System.Text;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;
using Xunit;

namespace ModelLab.Ledger.Tests.Entries;

public class LedgerAppenderTests
{
    [Fact]
    public void Numbers_run_from_one_and_each_entry_holds_the_hash_of_the_one_before()
    {
        var previous = Sha256Hash.Zero;
        var number = 0;
        foreach (var entry in SmallLedger.Batch.Entries)
        {
            Assert.Equal(++number, entry.Number);
            Assert.Equal(previous, entry.Previous);
            Assert.Equal(SmallLedger.Id, entry.LedgerId);
            previous = entry.Hash;
        }

        Assert.Equal(12, SmallLedger.Batch.Head.Count);
        Assert.Equal(previous, SmallLedger.Batch.Head.LastHash);
    }

    /// <summary>The bytes written out by hand, and the leaf hash of RFC 9162 section 2.1.1 computed beside the code under test.</summary>
    [Fact]
    public void Canonical_bytes_and_hash_are_those_documented()
    {
        var draft = new EntryDraft(
            "data-decision/1", new DateTimeOffset(2026, 3, 1, 10, 30, 0, TimeSpan.FromHours(1)).AddTicks(12345678),
            new Author("p1", "Ada"), "Typing \"error\"", JsonNode.Parse("""{"z":1.50,"a":[39,null]}""")!.AsObject());
        var entry = LedgerAppender.Append(LedgerHead.Empty("server"), [draft]).Entries[0];
        const string expected =
            "{\"at\":\"2026-03-01T09:30:01.234567Z\",\"body\":{\"a\":[39,null],\"z\":1.5},\"by\":{\"name\":\"Ada\",\"personId\":\"p1\"},"
            + "\"kind\":\"data-decision/1\",\"ledger\":\"server\",\"number\":1,"
            + "\"previous\":\"0000000000000000000000000000000000000000000000000000000000000000\",\"reason\":\"Typing \\\"error\\\"\"}";
        Assert.Equal(expected, Encoding.UTF8.GetString(entry.CanonicalBytes.Span));
        Assert.Equal(SHA256.HashData([0, .. Encoding.UTF8.GetBytes(expected)]), entry.Hash.Bytes.ToArray());
        Assert.Equal(new DateTimeOffset(2026, 3, 1, 9, 30, 1, 234, 567, TimeSpan.Zero), entry.At);
    }

    [Fact]
    public void One_batch_gives_the_same_bytes_as_entry_by_entry()
    {
        var head = LedgerHead.Empty(SmallLedger.Id);
        foreach (var (draft, expected) in SmallLedger.Drafts().Zip(SmallLedger.Batch.Entries))
        {
            var batch = LedgerAppender.Append(head, [draft]);
            Assert.Equal(expected, batch.Entries.Single());
            head = batch.Head;
        }

        Assert.Equal(SmallLedger.Batch.Head, head);
        Assert.Equal(SmallLedger.Batch.Head.Root, head.Root);
    }

    [Fact]
    public void An_empty_batch_leaves_the_head()
    {
        var batch = LedgerAppender.Append(SmallLedger.Batch.Head, []);
        Assert.Empty(batch.Entries);
        Assert.Equal(SmallLedger.Batch.Head, batch.Head);
    }

    [Fact]
    public void An_entry_does_not_follow_later_changes_of_the_drafts_body()
    {
        var body = new JsonObject { ["a"] = 1 };
        var entry = LedgerAppender.Append(LedgerHead.Empty("x"), [Draft() with { Body = body }]).Entries[0];
        body["a"] = 2;
        Assert.Equal(1, entry.Body["a"]!.GetValue<int>());
    }

    [Fact]
    public void A_draft_that_cannot_be_an_entry_is_refused_with_its_place_and_nothing_is_formed()
    {
        EntryDraft[] bad =
        [
            Draft() with { Kind = "Revision/1" },
            Draft() with { Kind = "revision" },
            Draft() with { By = new Author("", "Ada") },
            Draft() with { By = new Author("p1", " ") },
            Draft() with { Reason = "  " },
            Draft() with { Reason = "half \ud83d pair" },
            Draft() with { Body = new JsonObject { ["x"] = double.NaN } },
            Draft() with { Body = new JsonObject { ["x"] = long.MaxValue } },
            Draft() with { Sealed = new SealedContent("s", new byte[31], []) },
            Draft() with { Sealed = new SealedContent("", new byte[32], []) },
        ];
        foreach (var draft in bad)
        {
            var refusal = Assert.Throws<ArgumentException>(() => LedgerAppender.Append(LedgerHead.Empty("x"), [Draft(), draft]));
            Assert.Contains("Draft 2", refusal.Message, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void A_head_that_contradicts_itself_is_refused()
    {
        var good = SmallLedger.Batch.Head;
        LedgerHead[] bad =
        [
            good with { Count = 11 },
            good with { Count = -1 },
            good with { Count = 0, Frontier = [] },
            good with { LastHash = Sha256Hash.Zero },
            good with { Frontier = [.. good.Frontier, Sha256Hash.Zero] },
            LedgerHead.Empty("x") with { LastHash = good.LastHash },
            LedgerHead.Empty(" "),
        ];
        foreach (var head in bad)
        {
            Assert.Throws<ArgumentException>(() => LedgerAppender.Append(head, [Draft()]));
        }
    }

    private static EntryDraft Draft() => new(
        "revision/1", DateTimeOffset.UnixEpoch, new Author("p1", "Ada"), null, []);
}
