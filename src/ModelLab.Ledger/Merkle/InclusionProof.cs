namespace ModelLab.Ledger.Merkle;

/// <summary>
/// Shows that a leaf stands at its place in a tree of a known root and size (RFC 9162 section 2.1.3). Both must come from
/// a receipt: a proof does not bind the size by itself, since trees of other sizes can have the same turns on the way up.
/// </summary>
/// <param name="LeafIndex">Place of the leaf, from 0; an entry's number less one.</param>
/// <param name="TreeSize">Leaves in the tree.</param>
/// <param name="Path">Roots of the neighbouring subtrees from the leaf upwards.</param>
public sealed record InclusionProof(long LeafIndex, long TreeSize, IReadOnlyList<Sha256Hash> Path)
{
    /// <summary>Makes the proof from all leaf hashes of the tree.</summary>
    /// <param name="leaves">Leaf hashes of the whole tree, in order.</param>
    /// <param name="leafIndex">Place of the leaf, from 0.</param>
    /// <exception cref="ArgumentOutOfRangeException">No such leaf.</exception>
    public static InclusionProof Make(IReadOnlyList<Sha256Hash> leaves, int leafIndex)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(leafIndex);
        ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual(leafIndex, leaves.Count);
        var path = new List<Sha256Hash>();
        var start = 0;
        var end = leaves.Count;
        while (end - start > 1)
        {
            var middle = start + MerkleRoot.Split(end - start);
            if (leafIndex < middle)
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

        path.Reverse();
        return new InclusionProof(leafIndex, leaves.Count, path);
    }

    /// <summary>Whether the proof leads from the leaf to the root (RFC 9162 section 2.1.3.2).</summary>
    /// <param name="leaf">Hash of the leaf.</param>
    /// <param name="root">Root of the tree, from a receipt.</param>
    public bool Verify(Sha256Hash leaf, Sha256Hash root)
    {
        if (LeafIndex < 0 || LeafIndex >= TreeSize)
        {
            return false;
        }

        var place = LeafIndex;
        var last = TreeSize - 1;
        var hash = leaf;
        foreach (var neighbour in Path)
        {
            if (last == 0)
            {
                return false;
            }

            if ((place & 1) == 1 || place == last)
            {
                hash = MerkleHash.Node(neighbour, hash);
                while ((place & 1) == 0 && place != 0)
                {
                    place >>= 1;
                    last >>= 1;
                }
            }
            else
            {
                hash = MerkleHash.Node(hash, neighbour);
            }

            place >>= 1;
            last >>= 1;
        }

        return last == 0 && hash == root;
    }
}
