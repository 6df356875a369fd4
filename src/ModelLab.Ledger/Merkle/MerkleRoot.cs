namespace ModelLab.Ledger.Merkle;

/// <summary>Root of a Merkle tree from all its leaf hashes (RFC 9162 section 2.1.1).</summary>
public static class MerkleRoot
{
    /// <summary>Root over all leaves given.</summary>
    public static Sha256Hash Of(IReadOnlyList<Sha256Hash> leaves) => Of(leaves, 0, leaves.Count);

    /// <summary>Root over the leaves from <paramref name="start"/> up to but not with <paramref name="end"/>.</summary>
    internal static Sha256Hash Of(IReadOnlyList<Sha256Hash> leaves, int start, int end)
    {
        var frontier = new MerkleFrontier();
        for (var i = start; i < end; i++)
        {
            frontier.Append(leaves[i]);
        }

        return frontier.Root;
    }

    /// <summary>The largest power of two smaller than a count of at least 2: where a tree divides.</summary>
    internal static int Split(int count) => 1 << (31 - System.Numerics.BitOperations.LeadingZeroCount((uint)(count - 1)));
}
