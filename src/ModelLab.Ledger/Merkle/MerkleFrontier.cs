using System.Numerics;

namespace ModelLab.Ledger.Merkle;

/// <summary>
/// What must be kept of a Merkle tree to append to it and to name its root: the roots of its complete subtrees, largest
/// first, one for each binary digit 1 of the leaf count. Takes log2 of the count in memory.
/// </summary>
public sealed class MerkleFrontier
{
    private readonly List<Sha256Hash> roots;

    /// <summary>The tree without leaves.</summary>
    public MerkleFrontier() => roots = [];

    /// <summary>Goes on from a stored frontier.</summary>
    /// <param name="count">Leaves in the tree.</param>
    /// <param name="subtreeRoots">Roots of its complete subtrees, largest first.</param>
    /// <exception cref="ArgumentException">The count is negative or does not call for that many subtrees.</exception>
    public MerkleFrontier(long count, IReadOnlyList<Sha256Hash> subtreeRoots)
    {
        if (count < 0 || BitOperations.PopCount((ulong)count) != subtreeRoots.Count)
        {
            throw new ArgumentException($"A tree of {count} leaves does not have {subtreeRoots.Count} complete subtrees.", nameof(subtreeRoots));
        }

        Count = count;
        roots = [.. subtreeRoots];
    }

    /// <summary>Leaves so far.</summary>
    public long Count { get; private set; }

    /// <summary>A copy of the roots of the complete subtrees, largest first.</summary>
    public IReadOnlyList<Sha256Hash> SubtreeRoots => [.. roots];

    /// <summary>Root of the tree over all leaves so far (RFC 9162 section 2.1.1).</summary>
    public Sha256Hash Root
    {
        get
        {
            if (roots.Count == 0)
            {
                return MerkleHash.Empty;
            }

            var root = roots[^1];
            for (var i = roots.Count - 2; i >= 0; i--)
            {
                root = MerkleHash.Node(roots[i], root);
            }

            return root;
        }
    }

    /// <summary>Appends a leaf by its hash; subtrees that become complete are joined.</summary>
    public void Append(Sha256Hash leaf)
    {
        var node = leaf;
        for (var rest = Count; (rest & 1) == 1; rest >>= 1)
        {
            node = MerkleHash.Node(roots[^1], node);
            roots.RemoveAt(roots.Count - 1);
        }

        roots.Add(node);
        Count++;
    }
}
