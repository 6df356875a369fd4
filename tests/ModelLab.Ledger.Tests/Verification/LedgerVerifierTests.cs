using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Receipts;
using ModelLab.Ledger.Verification;
using Xunit;

namespace ModelLab.Ledger.Tests.Verification;

public class LedgerVerifierTests
{
    [Fact]
    public void An_untouched_ledger_passes_and_gives_its_head()
    {
        var result = Verify(SmallLedger.Batch.Entries, SmallLedger.Batch.Head);
        Assert.True(result.Ok, result.Problem);
        Assert.Null(result.Problem);
        Assert.Null(result.FirstBad);
        Assert.Equal(12, result.Entries);
        Assert.Equal(SmallLedger.Batch.Head, result.Head);
        Assert.Equal(0, result.StepsBackInTime);
    }

    [Fact]
    public void An_empty_ledger_passes_with_the_empty_head()
    {
        var result = new LedgerVerifier("x").Finish(LedgerHead.Empty("x"));
        Assert.True(result.Ok, result.Problem);
        Assert.Equal(LedgerHead.Empty("x"), result.Head);
    }

    [Fact]
    public void The_first_bad_entry_is_kept_and_counting_goes_on()
    {
        var entries = SmallLedger.Batch.Entries.ToList();
        entries.RemoveAt(4);
        var result = Verify(entries, SmallLedger.Batch.Head);
        Assert.False(result.Ok);
        Assert.Equal(5, result.FirstBad);
        Assert.Equal(11, result.Entries);
        Assert.Equal(4, result.Head.Count);
        Assert.Equal("Entry 5 calls itself number 6: entries are missing, doubled or out of order.", result.Problem);
    }

    [Fact]
    public void A_clock_set_back_is_told_but_is_no_fault()
    {
        var drafts = SmallLedger.Drafts().ToArray();
        drafts[6] = drafts[6] with { At = drafts[2].At };
        var batch = LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), drafts);
        var result = Verify(batch.Entries, batch.Head);
        Assert.True(result.Ok, result.Problem);
        Assert.Equal(1, result.StepsBackInTime);
        Assert.Equal(7, result.FirstStepBackInTime);
    }

    [Fact]
    public void A_cut_tail_is_told_by_the_stored_head_with_the_first_entry_missing()
    {
        var result = Verify(SmallLedger.Batch.Entries.Take(9), SmallLedger.Batch.Head);
        Assert.False(result.Ok);
        Assert.Equal(10, result.FirstBad);
        Assert.Equal("The stored head counts 12 entries and 9 are there: the tail from entry 10 on is missing.", result.Problem);
    }

    [Fact]
    public void A_ledger_rewritten_from_one_entry_on_is_told_by_the_stored_head_with_the_range()
    {
        var drafts = SmallLedger.Drafts().ToArray();
        drafts[9] = drafts[9] with { Reason = "Another reason" };
        var rewritten = LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), drafts);
        var result = Verify(rewritten.Entries, SmallLedger.Batch.Head);
        Assert.False(result.Ok);
        Assert.Equal("The entries are not those the stored head was made of: the first difference lies in entries 9 to 12.", result.Problem);
        Assert.Null(result.FirstBad);
    }

    [Fact]
    public void Receipts_are_held_against_the_entries_while_they_pass_and_each_is_answered_for()
    {
        var early = TestKeys.Signer.Sign(LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), [.. SmallLedger.Drafts().Take(5)]).Head, TestKeys.SignedAt);
        var foreign = TestKeys.Signer.Sign(SmallLedger.Form("another-ledger").Head, TestKeys.SignedAt);
        var result = Verify(SmallLedger.Batch.Entries, SmallLedger.Batch.Head, TestKeys.Receipt, early);
        Assert.True(result.Ok, result.Problem);
        Assert.Equal([5L, 12L], result.Receipts.Select(r => r.Receipt.Count));
        Assert.All(result.Receipts, r => Assert.True(r.Check is { Ok: true, KeyPinned: true }));

        result = Verify(SmallLedger.Batch.Entries, SmallLedger.Batch.Head, early, foreign);
        Assert.False(result.Ok);
        Assert.Equal("A receipt is for the ledger 'another-ledger', not for '7f3c1d52-0a4e-4c39-9b0e-5d1f6a2b8c90'.", result.Problem);
        Assert.Equal([true, false], result.Receipts.Select(r => r.Check.Ok));
    }

    [Fact]
    public void A_ledger_rewritten_after_one_receipt_and_before_the_next_is_told_with_the_range()
    {
        var early = TestKeys.Signer.Sign(LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), [.. SmallLedger.Drafts().Take(5)]).Head, TestKeys.SignedAt);
        var drafts = SmallLedger.Drafts().ToArray();
        drafts[6] = drafts[6] with { Reason = "Another reason" };
        var rewritten = LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), drafts);
        var result = Verify(rewritten.Entries, rewritten.Head, early, TestKeys.Receipt);
        Assert.False(result.Ok);
        Assert.Equal(
            "The entries are not those the receipt over 12 of them was given for: one of entries 6 to 12 was changed, left out or moved.",
            result.Problem);
        Assert.Equal([true, false], result.Receipts.Select(r => r.Check.Ok));
    }

    [Fact]
    public void Entries_after_a_receipt_are_no_fault()
    {
        var grown = LedgerAppender.Append(SmallLedger.Batch.Head, SmallLedger.Drafts());
        var result = Verify(SmallLedger.Batch.Entries.Concat(grown.Entries), grown.Head, TestKeys.Receipt);
        Assert.True(result.Ok, result.Problem);
        Assert.Equal(24, result.Head.Count);
    }

    [Fact]
    public void What_is_wrong_with_the_form_of_an_entry_is_told_with_the_byte()
    {
        var verifier = new LedgerVerifier(SmallLedger.Id);
        verifier.Add("{\"at\": 1}"u8.ToArray());
        Assert.Equal("Entry 1 is not what an entry is stored as. Byte 6: \" should stand here.", verifier.Finish().Problem);
    }

    private static VerificationResult Verify(IEnumerable<LedgerEntry> entries, LedgerHead? head, params Receipt[] receipts)
    {
        var verifier = new LedgerVerifier(SmallLedger.Id, receipts, TestKeys.Verifier);
        foreach (var entry in entries)
        {
            verifier.Add(entry.CanonicalBytes);
        }

        return verifier.Finish(head);
    }
}
