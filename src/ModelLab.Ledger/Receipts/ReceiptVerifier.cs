using ModelLab.Ledger.Merkle;

namespace ModelLab.Ledger.Receipts;

/// <summary>What a check of a receipt found.</summary>
/// <param name="Ok">Nothing wrong.</param>
/// <param name="KeyPinned">
/// The key is one that the verifier was told to trust. Where false although all else is right, the receipt proves only
/// that somebody's key signed it: compare its fingerprint with the one the server's owner has published.
/// </param>
/// <param name="Problem">What is wrong, in one sentence, or null.</param>
public sealed record ReceiptCheck(bool Ok, bool KeyPinned, string? Problem);

/// <summary>Checks receipts: signature, key, and what they state against entries or against other receipts.</summary>
public sealed class ReceiptVerifier
{
    private readonly HashSet<Sha256Hash>? trusted;

    /// <summary>Any key is taken; checks say that it is not pinned.</summary>
    public ReceiptVerifier()
    {
    }

    /// <summary>Only these keys are taken.</summary>
    /// <param name="trustedFingerprints">Fingerprints of the server's keys (<see cref="ReceiptKey.Fingerprint"/>), old ones too.</param>
    public ReceiptVerifier(IEnumerable<Sha256Hash> trustedFingerprints) => trusted = [.. trustedFingerprints];

    /// <summary>Checks key and signature.</summary>
    public ReceiptCheck CheckSignature(Receipt receipt)
    {
        if (trusted is not null && !trusted.Contains(receipt.Key.Fingerprint))
        {
            return new ReceiptCheck(false, false, $"The receipt was signed with the key {receipt.Key.Fingerprint}, which is none of those trusted.");
        }

        return receipt.Key.Verifies(receipt.SignedBytes(), receipt.Signature.Span)
            ? new ReceiptCheck(true, trusted is not null, null)
            : new ReceiptCheck(false, trusted is not null, "The receipt's signature does not fit what it states: it was altered, or signed with another key.");
    }

    /// <summary>Checks that the first entries of a ledger are those the receipt was given for.</summary>
    /// <param name="receipt">The receipt.</param>
    /// <param name="ledgerId">The ledger the hashes come from.</param>
    /// <param name="entryHashes">Hashes of its entries in order; later ones may follow.</param>
    public ReceiptCheck CheckEntries(Receipt receipt, string ledgerId, IReadOnlyList<Sha256Hash> entryHashes)
    {
        if (receipt.LedgerId != ledgerId)
        {
            return Wrong(receipt, $"The receipt is for the ledger '{receipt.LedgerId}', not for '{ledgerId}'.");
        }

        if (receipt.Count > entryHashes.Count)
        {
            return Wrong(receipt, $"The receipt counts {receipt.Count} entries and {entryHashes.Count} are there: the tail is missing.");
        }

        var count = (int)receipt.Count;
        return MerkleRoot.Of(entryHashes, 0, count) == receipt.Root && entryHashes[count - 1] == receipt.HeadHash
            ? CheckSignature(receipt)
            : Wrong(receipt, $"The first {count} entries are not those the receipt was given for.");
    }

    /// <summary>Checks that one entry is among those a receipt was given for, without the others.</summary>
    /// <param name="receipt">The receipt.</param>
    /// <param name="canonicalBytes">The entry's stored bytes.</param>
    /// <param name="proof">Its place in the tree of that size.</param>
    public ReceiptCheck CheckInclusion(Receipt receipt, ReadOnlySpan<byte> canonicalBytes, InclusionProof proof) =>
        proof.TreeSize == receipt.Count && proof.Verify(MerkleHash.Leaf(canonicalBytes), receipt.Root)
            ? CheckSignature(receipt)
            : Wrong(receipt, "The proof does not lead from the entry to the root that the receipt names.");

    /// <summary>Checks that a later receipt's ledger is an earlier one's with entries appended.</summary>
    /// <param name="earlier">The receipt of fewer or as many entries.</param>
    /// <param name="later">The receipt of more or as many.</param>
    /// <param name="proof">Leads to both roots.</param>
    public ReceiptCheck CheckConsistency(Receipt earlier, Receipt later, ConsistencyProof proof)
    {
        if (earlier.LedgerId != later.LedgerId)
        {
            return Wrong(earlier, "The receipts are for different ledgers.");
        }

        if (proof.FirstSize != earlier.Count || proof.SecondSize != later.Count || !proof.Verify(earlier.Root, later.Root)
            || (earlier.Count == later.Count && earlier.HeadHash != later.HeadHash))
        {
            return Wrong(earlier, $"The proof does not show that the {later.Count} entries of the later receipt begin with the {earlier.Count} of the earlier.");
        }

        var first = CheckSignature(earlier);
        return first.Ok ? CheckSignature(later) : first;
    }

    private ReceiptCheck Wrong(Receipt receipt, string problem) =>
        new(false, trusted?.Contains(receipt.Key.Fingerprint) ?? false, problem);
}
