using ModelLab.Ledger.Merkle;

namespace ModelLab.Ledger.Entries;

/// <summary>Where a ledger stands: enough to append to it and to sign it, without reading it.</summary>
/// <param name="LedgerId">Id of the project, or <c>server</c>.</param>
/// <param name="Count">Entries so far; the last one's number.</param>
/// <param name="LastHash">Hash of the last entry; zero for none.</param>
/// <param name="Frontier">Roots of the complete subtrees of the Merkle tree, largest first (RFC 9162).</param>
public sealed record LedgerHead(string LedgerId, long Count, Sha256Hash LastHash, IReadOnlyList<Sha256Hash> Frontier)
{
    /// <summary>Root of the Merkle tree over all entries; SHA-256 of nothing for none.</summary>
    /// <exception cref="ArgumentException">The frontier does not fit the count.</exception>
    public Sha256Hash Root => new MerkleFrontier(Count, Frontier).Root;

    /// <summary>The head of a ledger with no entry.</summary>
    public static LedgerHead Empty(string ledgerId) => new(ledgerId, 0, Sha256Hash.Zero, []);

    /// <summary>Two heads are equal when all their values are, the frontier's one by one.</summary>
    public bool Equals(LedgerHead? other) =>
        other is not null && LedgerId == other.LedgerId && Count == other.Count && LastHash == other.LastHash
        && Frontier.SequenceEqual(other.Frontier);

    /// <inheritdoc/>
    public override int GetHashCode() => HashCode.Combine(LedgerId, Count, LastHash);
}
