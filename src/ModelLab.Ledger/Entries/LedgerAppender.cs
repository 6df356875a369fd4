using ModelLab.Ledger.Canonical;
using ModelLab.Ledger.Merkle;

namespace ModelLab.Ledger.Entries;

/// <summary>A batch of entries with the head after them.</summary>
/// <param name="Head">The head after the batch.</param>
/// <param name="Entries">The entries in order.</param>
public sealed record AppendedBatch(LedgerHead Head, IReadOnlyList<LedgerEntry> Entries);

/// <summary>Numbers, chains and hashes drafts.</summary>
public static class LedgerAppender
{
    /// <summary>Forms the entries that follow a head. Pure: nothing is stored.</summary>
    /// <param name="head">Where the ledger stands.</param>
    /// <param name="drafts">What is to be recorded, in order; together or not at all.</param>
    /// <exception cref="ArgumentException">
    /// A draft cannot be an entry (its place in the batch and what is wrong are named), or the head contradicts itself.
    /// </exception>
    public static AppendedBatch Append(LedgerHead head, IReadOnlyList<EntryDraft> drafts)
    {
        var tree = new MerkleFrontier(head.Count, head.Frontier);
        if (head.Count == 0 != (head.LastHash == Sha256Hash.Zero))
        {
            throw new ArgumentException("The head's last hash does not fit its count: it is zero for no entry, and only then.", nameof(head));
        }

        var entries = new List<LedgerEntry>(drafts.Count);
        var last = head.LastHash;
        foreach (var draft in drafts)
        {
            if (tree.Count >= CanonicalNumber.LargestExactInteger - 1)
            {
                throw new ArgumentException("The ledger's numbers are used up.", nameof(head));
            }

            // What is handed out is read back from the bytes, so that it cannot say anything else than they do.
            var entry = LedgerEntry.Parse(Form(head.LedgerId, tree.Count + 1, last, draft, entries.Count + 1));
            entries.Add(entry);
            tree.Append(entry.Hash);
            last = entry.Hash;
        }

        return new AppendedBatch(new LedgerHead(head.LedgerId, tree.Count, last, tree.SubtreeRoots), entries);
    }

    private static byte[] Form(string ledgerId, long number, Sha256Hash previous, EntryDraft draft, int place)
    {
        try
        {
            var reference = draft.Sealed is { } part
                ? new SealedReference(part.SourceId, SealedCommitment.Of(part.Salt, part.Content))
                : null;
            var envelope = new EntryEnvelope(
                ledgerId, number, draft.Kind, draft.At, draft.By, draft.Reason, reference, previous, 0, 0);
            return envelope.Problem() is { } problem ? throw new ArgumentException(problem) : envelope.Write(draft.Body);
        }
        catch (ArgumentException e)
        {
            throw new ArgumentException($"Draft {place} ({draft.Kind}) cannot be recorded. {e.Message}", nameof(draft), e);
        }
    }
}
