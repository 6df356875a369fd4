using System.Numerics;

namespace ModelLab.Ledger.Merkle;

/// <summary>
/// Shows that a tree is an earlier one with leaves appended, nothing before them changed (RFC 9162 section 2.1.4). Sizes
/// and roots must come from receipts: a proof does not bind the sizes by itself.
/// </summary>
/// <param name="FirstSize">Leaves in the earlier tree, at least 1.</param>
/// <param name="SecondSize">Leaves in the later tree.</param>
/// <param name="Path">Roots of subtrees that lead to both roots; empty where the sizes are equal.</param>
public sealed record ConsistencyProof(long FirstSize, long SecondSize, IReadOnlyList<Sha256Hash> Path)
{
    /// <summary>Makes the proof from all leaf hashes of the later tree.</summary>
    /// <param name="leaves">Leaf hashes of the later tree, in order.</param>
    /// <param name="firstSize">Leaves in the earlier tree, from 1 to the later one's.</param>
    /// <exception cref="ArgumentOutOfRangeException">No such earlier tree.</exception>
    public static ConsistencyProof Make(IReadOnlyList<Sha256Hash> leaves, int firstSize)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(firstSize, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(firstSize, leaves.Count);
        var path = new List<Sha256Hash>();
        var start = 0;
        var end = leaves.Count;
        while (firstSize != end)
        {
            var middle = start + MerkleRoot.Split(end - start);
            if (firstSize <= middle)
            {
                path.Add(MerkleRoot.Of(leaves, middle, end));
                end = middle;
            }
            else
            {
                path.Add(MerkleRoot.Of(leaves, start, middle));
                start = middle;
            }
        }

        // Where the walk ends at the earlier tree itself, whoever checks holds its root already.
        if (start != 0)
        {
            path.Add(MerkleRoot.Of(leaves, start, end));
        }

        path.Reverse();
        return new ConsistencyProof(firstSize, leaves.Count, path);
    }

    /// <summary>Whether the proof leads to both roots (RFC 9162 section 2.1.4.2).</summary>
    /// <param name="firstRoot">Root of the earlier tree, from a receipt.</param>
    /// <param name="secondRoot">Root of the later tree.</param>
    public bool Verify(Sha256Hash firstRoot, Sha256Hash secondRoot)
    {
        if (FirstSize < 1 || FirstSize > SecondSize)
        {
            return false;
        }

        if (FirstSize == SecondSize)
        {
            return Path.Count == 0 && firstRoot == secondRoot;
        }

        // Of a complete earlier tree the path leaves out its root, which is given.
        Sha256Hash[] nodes = BitOperations.IsPow2(FirstSize) ? [firstRoot, .. Path] : [.. Path];
        return nodes.Length > 0 && Path.Count > 0 && Climb(nodes, firstRoot, secondRoot);
    }

    private bool Climb(Sha256Hash[] nodes, Sha256Hash firstRoot, Sha256Hash secondRoot)
    {
        var first = FirstSize - 1;
        var last = SecondSize - 1;
        while ((first & 1) == 1)
        {
            first >>= 1;
            last >>= 1;
        }

        var earlier = nodes[0];
        var later = nodes[0];
        foreach (var node in nodes.AsSpan(1))
        {
            if (last == 0)
            {
                return false;
            }

            if ((first & 1) == 1 || first == last)
            {
                earlier = MerkleHash.Node(node, earlier);
                later = MerkleHash.Node(node, later);
                while ((first & 1) == 0 && first != 0)
                {
                    first >>= 1;
                    last >>= 1;
                }
            }
            else
            {
                later = MerkleHash.Node(later, node);
            }

            first >>= 1;
            last >>= 1;
        }

        return last == 0 && earlier == firstRoot && later == secondRoot;
    }
}
