using ModelLab.Ledger.Merkle;
using Xunit;

namespace ModelLab.Ledger.Tests.Merkle;

public class ProofTests
{
    [Fact]
    public void Inclusion_proofs_of_all_leaves_of_all_sizes_are_those_of_the_definition_and_hold()
    {
        for (var size = 1; size < TestLeaves.Largest; size++)
        {
            for (var leaf = 0; leaf < size; leaf++)
            {
                var proof = InclusionProof.Make(TestLeaves.Hashes[..size], leaf);
                Assert.Equal(LiteralMerkleTree.Path(leaf, TestLeaves.Data[..size]), proof.Path.Select(h => h.Bytes.ToArray()));
                Assert.True(proof.Verify(TestLeaves.Hashes[leaf], TestLeaves.Root(size)));
            }
        }
    }

    [Fact]
    public void Consistency_proofs_of_all_pairs_of_sizes_are_those_of_the_definition_and_hold()
    {
        for (var second = 1; second < TestLeaves.Largest; second++)
        {
            for (var first = 1; first <= second; first++)
            {
                var proof = ConsistencyProof.Make(TestLeaves.Hashes[..second], first);
                Assert.Equal(LiteralMerkleTree.Proof(first, TestLeaves.Data[..second]), proof.Path.Select(h => h.Bytes.ToArray()));
                Assert.True(proof.Verify(TestLeaves.Root(first), TestLeaves.Root(second)));
            }
        }
    }

    [Fact]
    public void Proofs_for_leaves_and_sizes_that_are_not_there_are_not_made()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => InclusionProof.Make(TestLeaves.Hashes[..4], 4));
        Assert.Throws<ArgumentOutOfRangeException>(() => InclusionProof.Make(TestLeaves.Hashes[..4], -1));
        Assert.Throws<ArgumentOutOfRangeException>(() => InclusionProof.Make([], 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => ConsistencyProof.Make(TestLeaves.Hashes[..4], 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => ConsistencyProof.Make(TestLeaves.Hashes[..4], 5));
    }

    /// <summary>Trees of very many leaves: numbers beyond 32 bits in the way up.</summary>
    [Fact]
    public void Proofs_of_large_trees_are_checked_with_large_numbers()
    {
        const long size = (1L << 40) + 1;
        var subtree = TestLeaves.Hashes[0];
        var leaf = TestLeaves.Hashes[1];
        var root = MerkleHash.Node(subtree, leaf);
        Assert.True(new InclusionProof(size - 1, size, [subtree]).Verify(leaf, root));
        Assert.False(new InclusionProof(size - 2, size, [subtree]).Verify(leaf, root));
        Assert.True(new ConsistencyProof(size - 1, size, [leaf]).Verify(subtree, root));
        Assert.False(new ConsistencyProof(size - 2, size, [leaf]).Verify(subtree, root));
    }
}
