using ModelLab.Ledger.Merkle;
using ModelLab.Ledger.Receipts;

namespace ModelLab.Ledger.Verification;

/// <summary>Holds receipts against a ledger while its entries pass by.</summary>
internal sealed class ReceiptComparison(string ledgerId, IReadOnlyList<Receipt> receipts, ReceiptVerifier verifier)
{
    private readonly Receipt[] waiting = [.. receipts.OrderBy(r => r.Count)];
    private readonly List<ReceiptFinding> findings = [];
    private long confirmed;

    /// <summary>The first receipt that does not fit, as a difference; null for none.</summary>
    public Difference? FirstDifference { get; private set; }

    /// <summary>Compares the receipts that count exactly the entries so far.</summary>
    public void Reached(MerkleFrontier tree, Sha256Hash last)
    {
        Sha256Hash? root = null;
        while (Next is { } receipt && receipt.Count <= tree.Count)
        {
            root ??= tree.Root;
            Take(receipt, Fault(receipt, root.Value, last, tree.Count), null);
        }
    }

    /// <summary>Ends it: receipts that count more entries than there are.</summary>
    public IReadOnlyList<ReceiptFinding> Finish(long goodEntries)
    {
        while (Next is { } receipt)
        {
            var foreign = ForeignLedger(receipt);
            Take(
                receipt,
                foreign ?? $"A receipt counts {receipt.Count} entries and {goodEntries} sound ones are there: the tail from entry {goodEntries + 1} on is missing or bad.",
                foreign is null ? goodEntries + 1 : null);
        }

        return [.. findings];
    }

    private Receipt? Next => findings.Count < waiting.Length ? waiting[findings.Count] : null;

    private void Take(Receipt receipt, string? fault, long? firstBad)
    {
        var signature = verifier.CheckSignature(receipt);
        var check = signature.Ok && fault is not null ? signature with { Ok = false, Problem = fault } : signature;
        findings.Add(new ReceiptFinding(receipt, check));
        if (check.Ok)
        {
            confirmed = receipt.Count;
        }
        else
        {
            FirstDifference ??= new Difference(signature.Ok ? firstBad : null, check.Problem!);
        }
    }

    private string? ForeignLedger(Receipt receipt) => receipt.LedgerId == ledgerId
        ? null
        : $"A receipt is for the ledger '{receipt.LedgerId}', not for '{ledgerId}'.";

    private string? Fault(Receipt receipt, Sha256Hash root, Sha256Hash last, long count)
    {
        if (ForeignLedger(receipt) is { } foreign)
        {
            return foreign;
        }

        // A count below 1 never comes from a signer; it is met at the first entry and cannot fit.
        return receipt.Count == count && receipt.Root == root && receipt.HeadHash == last
            ? null
            : $"The entries are not those the receipt over {receipt.Count} of them was given for: one of entries {confirmed + 1} to {receipt.Count} was changed, left out or moved.";
    }
}
