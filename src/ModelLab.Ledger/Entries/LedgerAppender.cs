namespace ModelLab.Ledger.Entries;

/// <summary>Where a ledger stands: enough to append to it and to sign it, without reading it.</summary>
/// <param name="LedgerId">Id of the project, or <c>server</c>.</param>
/// <param name="Count">Entries so far; the last one's number.</param>
/// <param name="LastHash">Hash of the last entry; zero for none.</param>
/// <param name="Frontier">Roots of the complete subtrees of the Merkle tree, largest first (RFC 9162).</param>
public sealed record LedgerHead(string LedgerId, long Count, Sha256Hash LastHash, IReadOnlyList<Sha256Hash> Frontier)
{
    /// <summary>The head of a ledger with no entry.</summary>
    public static LedgerHead Empty(string ledgerId) => new(ledgerId, 0, Sha256Hash.Zero, []);

    /// <summary>Root of the Merkle tree over all entries.</summary>
    public Sha256Hash Root => throw new NotImplementedException();
}

/// <summary>A batch of entries with the head after them.</summary>
public sealed record AppendedBatch(LedgerHead Head, IReadOnlyList<LedgerEntry> Entries);

/// <summary>Numbers, chains and hashes drafts.</summary>
public static class LedgerAppender
{
    /// <summary>Forms the entries that follow a head. Pure: nothing is stored.</summary>
    public static AppendedBatch Append(LedgerHead head, IReadOnlyList<EntryDraft> drafts) => throw new NotImplementedException();
}
