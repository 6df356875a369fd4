using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Merkle;
using ModelLab.Ledger.Receipts;

namespace ModelLab.Ledger.Verification;

/// <summary>
/// Verifies stored bytes: form, ledger, numbers, chain, tree. Takes one entry at a time and keeps the frontier of the
/// tree alone, so that the length of a ledger does not matter. With receipts at hand, what they state is compared on the way.
/// </summary>
public sealed class LedgerVerifier
{
    private readonly string ledgerId;
    private readonly ReceiptComparison receipts;
    private readonly MerkleFrontier tree = new();
    private Sha256Hash last = Sha256Hash.Zero;
    private DateTimeOffset lastAt = DateTimeOffset.MinValue;
    private long entries;
    private Difference? firstBad;
    private long stepsBack;
    private long? firstStepBack;

    /// <summary>Begins a verification of one ledger.</summary>
    /// <param name="ledgerId">The ledger all entries must name.</param>
    public LedgerVerifier(string ledgerId)
        : this(ledgerId, [], new ReceiptVerifier())
    {
    }

    /// <summary>Begins a verification of one ledger with receipts at hand.</summary>
    /// <param name="ledgerId">The ledger all entries must name.</param>
    /// <param name="receipts">Receipts kept apart from it, of any sizes in any order.</param>
    /// <param name="receiptVerifier">Checks their signatures, with the server's keys pinned where they are known.</param>
    public LedgerVerifier(string ledgerId, IReadOnlyList<Receipt> receipts, ReceiptVerifier receiptVerifier)
    {
        this.ledgerId = ledgerId;
        this.receipts = new ReceiptComparison(ledgerId, receipts, receiptVerifier);
    }

    private LedgerHead Head => new(ledgerId, tree.Count, last, tree.SubtreeRoots);

    /// <summary>Takes the next entry's stored bytes. Goes on counting after a bad one, which is kept as the first.</summary>
    public void Add(ReadOnlyMemory<byte> canonicalBytes)
    {
        entries++;
        if (firstBad is not null)
        {
            return;
        }

        EntryEnvelope entry;
        try
        {
            entry = EntryEnvelope.Read(canonicalBytes.Span);
        }
        catch (FormatException e)
        {
            firstBad = new Difference(entries, $"Entry {entries} is not what an entry is stored as. {e.Message}");
            return;
        }

        if (FaultOf(entry) is { } fault)
        {
            firstBad = new Difference(entries, fault);
            return;
        }

        if (entry.At < lastAt)
        {
            stepsBack++;
            firstStepBack ??= entries;
        }

        lastAt = entry.At;
        last = MerkleHash.Leaf(canonicalBytes.Span);
        tree.Append(last);
        receipts.Reached(tree, last);
    }

    /// <summary>
    /// Ends it: compares with the stored head, where one is given (catches a cut tail), then says what the receipts told.
    /// A receipt that does not fit makes the whole not ok.
    /// </summary>
    public VerificationResult Finish(LedgerHead? storedHead = null)
    {
        var head = Head;
        var findings = receipts.Finish(tree.Count);
        var fault = firstBad ?? (storedHead is null ? null : HeadComparison.Compare(head, storedHead)) ?? receipts.FirstDifference;
        return new VerificationResult(fault is null, entries, head, fault?.FirstBad, fault?.Problem)
        {
            StepsBackInTime = stepsBack,
            FirstStepBackInTime = firstStepBack,
            Receipts = findings,
        };
    }

    private string? FaultOf(EntryEnvelope entry)
    {
        if (entry.LedgerId != ledgerId)
        {
            return $"Entry {entries} belongs to the ledger '{entry.LedgerId}', not to '{ledgerId}'.";
        }

        if (entry.Number != entries)
        {
            return $"Entry {entries} calls itself number {entry.Number}: entries are missing, doubled or out of order.";
        }

        return entry.Previous == last
            ? null
            : $"Entry {entries} does not follow the entry before it: it holds another hash of it, so one of the two was changed.";
    }
}
