using ModelLab.Ledger.Merkle;
using Xunit;

namespace ModelLab.Ledger.Tests.Merkle;

public class MerkleTreeTests
{
    private static readonly byte[][] PublishedLeaves =
    [
        .. new[] { "", "00", "10", "2021", "3031", "40414243", "5051525354555657", "606162636465666768696a6b6c6d6e6f" }
            .Select(Convert.FromHexString),
    ];

    /// <summary>
    /// The test vectors that implementations of RFC 6962 share (the tree test of the first Certificate Transparency
    /// implementation; repeated in transparency-dev/merkle, testonly): roots over the first 0 to 8 of eight leaves.
    /// </summary>
    [Theory]
    [InlineData(0, "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855")]
    [InlineData(1, "6e340b9cffb37a989ca544e6bb780a2c78901d3fb33738768511a30617afa01d")]
    [InlineData(2, "fac54203e7cc696cf0dfcb42c92a1d9dbaf70ad9e621f4bd8d98662f00e3c125")]
    [InlineData(3, "aeb6bcfe274b70a14fb067a5e5578264db0fa9b51af5e0ba159158f329e06e77")]
    [InlineData(4, "d37ee418976dd95753c1c73862b9398fa2a2cf9b4ff0fdfe8b30cd95209614b7")]
    [InlineData(5, "4e3bbb1f7b478dcfe71fb631631519a3bca12c9aefca1612bfce4c13a86264d4")]
    [InlineData(6, "76e67dadbcdf1e10e1b74ddc608abd2f98dfb16fbce75277b5232a127f2087ef")]
    [InlineData(7, "ddb89be403809e325750d3d263cd78929c2942b7942a34b77e122c9594a74c8c")]
    [InlineData(8, "5dc9da79a70659a9ad559cb701ded9a2ab9d823aad2f4960cfe370eff4604328")]
    public void Published_roots(int size, string root)
    {
        Assert.Equal(root, MerkleRoot.Of([.. PublishedLeaves.Take(size).Select(d => MerkleHash.Leaf(d))]).ToString());
        Assert.Equal(root, Convert.ToHexStringLower(LiteralMerkleTree.Mth(PublishedLeaves[..size])));
    }

    /// <summary>From the same vectors: the way from leaf 0 in a tree of 8, and the proofs from 6 to 8 and from 2 to 5.</summary>
    [Fact]
    public void Published_proofs()
    {
        Sha256Hash[] leaves = [.. PublishedLeaves.Select(d => MerkleHash.Leaf(d))];
        Assert.Equal(
            [
                "96a296d224f285c67bee93c30f8a309157f0daa35dc5b87e410b78630a09cfc7",
                "5f083f0a1a33ca076a95279832580db3e0ef4584bdff1f54c8a360f50de3031e",
                "6b47aaf29ee3c2af9af889bc1fb9254dabd31177f16232dd6aab035ca39bf6e4",
            ],
            InclusionProof.Make(leaves, 0).Path.Select(h => h.ToString()));
        Assert.Equal(
            [
                "0ebc5d3437fbe2db158b9f126a1d118e308181031d0a949f8dededebc558ef6a",
                "ca854ea128ed050b41b35ffc1b87b8eb2bde461e9e3b5596ece6b9d5975a0ae0",
                "d37ee418976dd95753c1c73862b9398fa2a2cf9b4ff0fdfe8b30cd95209614b7",
            ],
            ConsistencyProof.Make(leaves, 6).Path.Select(h => h.ToString()));
        Assert.Equal(
            [
                "5f083f0a1a33ca076a95279832580db3e0ef4584bdff1f54c8a360f50de3031e",
                "bc1a0643b12e4d2d7c77918f44e0f4f79a838b6cf9ec5b5c283e1f4d88599e6b",
            ],
            ConsistencyProof.Make(leaves[..5], 2).Path.Select(h => h.ToString()));
    }

    [Fact]
    public void Roots_of_all_sizes_are_those_of_the_definition_and_the_frontier_follows_leaf_by_leaf()
    {
        var frontier = new MerkleFrontier();
        for (var size = 0; size < TestLeaves.Largest; size++)
        {
            Assert.Equal(size, frontier.Count);
            Assert.Equal(LiteralMerkleTree.Mth(TestLeaves.Data[..size]), frontier.Root.Bytes.ToArray());
            Assert.Equal(frontier.Root, MerkleRoot.Of(TestLeaves.Hashes[..size]));
            Assert.Equal(int.PopCount(size), frontier.SubtreeRoots.Count);

            var resumed = new MerkleFrontier(size, frontier.SubtreeRoots);
            resumed.Append(TestLeaves.Hashes[size]);
            frontier.Append(TestLeaves.Hashes[size]);
            Assert.Equal(frontier.Root, resumed.Root);
        }
    }

    [Fact]
    public void Subtree_roots_are_roots_of_their_own_leaves_largest_first()
    {
        var frontier = new MerkleFrontier();
        foreach (var leaf in TestLeaves.Hashes[..13])
        {
            frontier.Append(leaf);
        }

        byte[][] expected = [LiteralMerkleTree.Mth(TestLeaves.Data[..8]), LiteralMerkleTree.Mth(TestLeaves.Data[8..12]), LiteralMerkleTree.Mth(TestLeaves.Data[12..13])];
        Assert.Equal(expected, frontier.SubtreeRoots.Select(h => h.Bytes.ToArray()));
    }

    [Theory]
    [InlineData(-1, 0)]
    [InlineData(0, 1)]
    [InlineData(1, 0)]
    [InlineData(3, 1)]
    [InlineData(8, 2)]
    public void A_frontier_that_does_not_fit_its_count_is_refused(long count, int subtrees) =>
        Assert.Throws<ArgumentException>(() => new MerkleFrontier(count, new Sha256Hash[subtrees]));
}
