using System.Security.Cryptography;
using System.Text;
using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Merkle;
using ModelLab.Ledger.Receipts;
using ModelLab.Ledger.Tests.Tampering;
using Xunit;

namespace ModelLab.Ledger.Tests.Receipts;

public class ReceiptTests
{
    [Fact]
    public void A_receipt_is_read_back_as_it_was_written()
    {
        var read = Receipt.Parse(TestKeys.Receipt.Write());
        Assert.Equal(TestKeys.Receipt, read);
        Assert.Equal(12, read.Count);
        Assert.Equal(SmallLedger.Batch.Head.Root, read.Root);
        Assert.Equal(SmallLedger.Batch.Head.LastHash, read.HeadHash);
        Assert.Equal(TestKeys.SignedAt, read.At);
        Assert.True(TestKeys.Verifier.CheckSignature(read).Ok);
    }

    [Fact]
    public void What_is_signed_is_the_domain_text_and_the_file_without_its_signature()
    {
        var file = Encoding.ASCII.GetString(TestKeys.Receipt.Write());
        var signature = Convert.ToBase64String(TestKeys.Receipt.Signature.Span);
        Assert.Equal(
            "ModelLab ledger receipt/1\n" + file.Replace($",\"signature\":\"{signature}\"", "", StringComparison.Ordinal),
            Encoding.ASCII.GetString(TestKeys.Receipt.SignedBytes()));
    }

    /// <summary>
    /// Key, message and signature from RFC 6979 appendix A.2.5 (P-256, SHA-256, message "sample"; values from memory):
    /// what the platform calls ECDSA with r ‖ s is what the standard calls so.
    /// </summary>
    [Fact]
    public void A_published_signature_is_accepted_and_its_alterations_are_not()
    {
        using var pair = ECDsa.Create(new ECParameters
        {
            Curve = ECCurve.NamedCurves.nistP256,
            Q = new ECPoint
            {
                X = Convert.FromHexString("60FED4BA255A9D31C961EB74C6356D68C049B8923B61FA6CE669622E60F29FB6"),
                Y = Convert.FromHexString("7903FE1008B8BC99A41AE9E95628BC64F2F1B20C2D7E9F5177A3C294D4462299"),
            },
        });
        var key = ReceiptKey.Of(pair);
        var signature = Convert.FromHexString(
            "EFD48B2AACB6A8FD1140DD9CD45E81D69D2C877B56AAF991C34D0EA84EAF3716F7CB1C942D657C41D436C7A1B6E29F65F3E900DBB9AFF4064DC4AB2F843ACDA8");
        Assert.True(key.Verifies("sample"u8, signature));
        Assert.False(key.Verifies("samples"u8, signature));
        for (var place = 0; place < signature.Length; place++)
        {
            var altered = (byte[])signature.Clone();
            altered[place] ^= 1;
            Assert.False(key.Verifies("sample"u8, altered));
        }
    }

    [Fact]
    public void A_key_that_is_not_pinned_is_told_and_one_that_is_not_trusted_is_refused()
    {
        var stranger = TestKeys.Stranger.Sign(SmallLedger.Batch.Head, TestKeys.SignedAt);
        Assert.Equal(new ReceiptCheck(true, false, null), new ReceiptVerifier().CheckSignature(stranger));
        Assert.Equal(new ReceiptCheck(true, true, null), TestKeys.Verifier.CheckSignature(TestKeys.Receipt));
        var refused = TestKeys.Verifier.CheckSignature(stranger);
        Assert.False(refused.Ok);
        Assert.Contains(stranger.Key.Fingerprint.ToString(), refused.Problem, StringComparison.Ordinal);
        Assert.True(new ReceiptVerifier([TestKeys.Signer.PublicKey.Fingerprint, stranger.Key.Fingerprint]).CheckSignature(stranger).Ok);
    }

    [Fact]
    public void A_receipt_holds_for_a_ledger_that_has_grown()
    {
        var grown = LedgerAppender.Append(SmallLedger.Batch.Head, SmallLedger.Drafts());
        Sha256Hash[] hashes = [.. SmallLedger.Batch.Entries.Concat(grown.Entries).Select(e => e.Hash)];
        Assert.True(TestKeys.Verifier.CheckEntries(TestKeys.Receipt, SmallLedger.Id, hashes).Ok);
        Assert.False(TestKeys.Verifier.CheckEntries(TestKeys.Receipt, SmallLedger.Id, hashes[..11]).Ok);
        Assert.False(TestKeys.Verifier.CheckEntries(TestKeys.Receipt, "another-ledger", hashes).Ok);

        var later = TestKeys.Signer.Sign(grown.Head, TestKeys.SignedAt);
        var proof = ConsistencyProof.Make(hashes, 12);
        Assert.True(TestKeys.Verifier.CheckConsistency(TestKeys.Receipt, later, proof).Ok);
        Assert.False(TestKeys.Verifier.CheckConsistency(later, TestKeys.Receipt, proof).Ok);
        Assert.False(TestKeys.Verifier.CheckConsistency(TestKeys.Receipt, later, ConsistencyProof.Make(hashes, 11)).Ok);
        Assert.False(TestKeys.Verifier.CheckConsistency(TestKeys.Receipt, later with { At = later.At.AddTicks(10) }, proof).Ok);
        Assert.False(TestKeys.Verifier.CheckConsistency(TestKeys.Receipt with { LedgerId = "x" }, later, proof).Ok);
    }

    [Fact]
    public void One_entry_is_shown_to_be_among_those_of_a_receipt_without_the_others()
    {
        Sha256Hash[] hashes = [.. SmallLedger.Batch.Entries.Select(e => e.Hash)];
        foreach (var entry in SmallLedger.Batch.Entries)
        {
            var proof = InclusionProof.Make(hashes, (int)entry.Number - 1);
            Assert.True(TestKeys.Verifier.CheckInclusion(TestKeys.Receipt, entry.CanonicalBytes.Span, proof).Ok);
            Assert.False(TestKeys.Verifier.CheckInclusion(TestKeys.Receipt, entry.CanonicalBytes.Span[1..], proof).Ok);
            Assert.False(TestKeys.Verifier.CheckInclusion(TestKeys.Receipt with { Count = 11 }, entry.CanonicalBytes.Span, proof).Ok);
        }
    }

    /// <summary>
    /// The last of 3 leaves is proved by one node, as the last of 2 would be: a proof does not bind its size. The receipt
    /// does.
    /// </summary>
    [Fact]
    public void A_proof_that_claims_another_size_is_refused_by_the_receipts_count()
    {
        var batch = LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), [.. SmallLedger.Drafts().Take(3)]);
        var receipt = TestKeys.Signer.Sign(batch.Head, TestKeys.SignedAt);
        var last = batch.Entries[2];
        var proof = InclusionProof.Make([.. batch.Entries.Select(e => e.Hash)], 2) with { LeafIndex = 1, TreeSize = 2 };
        Assert.True(proof.Verify(last.Hash, receipt.Root));
        Assert.False(TestKeys.Verifier.CheckInclusion(receipt, last.CanonicalBytes.Span, proof).Ok);
    }

    [Fact]
    public void A_receipt_signed_over_a_head_whose_last_hash_is_another_does_not_fit()
    {
        var receipt = TestKeys.Signer.Sign(SmallLedger.Batch.Head with { LastHash = Sha256Hash.Of([]) }, TestKeys.SignedAt);
        Assert.True(TestKeys.Verifier.CheckSignature(receipt).Ok);
        Assert.False(TestKeys.Verifier.CheckEntries(receipt, SmallLedger.Id, [.. SmallLedger.Batch.Entries.Select(e => e.Hash)]).Ok);
        Assert.False(LedgerTampering.Verify(SmallLedger.Batch.Entries.Select(e => e.CanonicalBytes.ToArray()), null, receipt).Ok);
        var same = ConsistencyProof.Make([.. SmallLedger.Batch.Entries.Select(e => e.Hash)], 12);
        Assert.False(TestKeys.Verifier.CheckConsistency(receipt, TestKeys.Receipt, same).Ok);
        Assert.True(TestKeys.Verifier.CheckConsistency(TestKeys.Receipt, TestKeys.Receipt, same).Ok);
    }

    [Fact]
    public void An_empty_ledger_is_not_signed() =>
        Assert.Throws<ArgumentException>(() => TestKeys.Signer.Sign(LedgerHead.Empty("x"), TestKeys.SignedAt));

    [Fact]
    public void Keys_on_other_curves_are_refused()
    {
        using var p384 = ECDsa.Create(ECCurve.NamedCurves.nistP384);
        Assert.Throws<ArgumentException>(() => new ReceiptSigner(p384));
        Assert.Throws<FormatException>(() => ReceiptKey.Parse(p384.ExportSubjectPublicKeyInfo()));
        Assert.Throws<FormatException>(() => ReceiptKey.Parse([]));
        byte[] offCurve = [.. TestKeys.Signer.PublicKey.PublicKeyInfo];
        offCurve[^1] ^= 1;
        Assert.Throws<FormatException>(() => ReceiptKey.Parse(offCurve));
    }
}
