using ModelLab.Ledger.Merkle;

namespace ModelLab.Ledger.Tests.Merkle;

/// <summary>Leaves for the tests of the tree.</summary>
internal static class TestLeaves
{
    public const int Largest = 17;

    public static byte[][] Data { get; } = [.. Enumerable.Range(0, Largest).Select(i => Enumerable.Range(0, i).Select(j => (byte)((17 * i) + j)).ToArray())];

    public static Sha256Hash[] Hashes { get; } = [.. Data.Select(d => MerkleHash.Leaf(d))];

    private static readonly Sha256Hash[] Roots = [.. Enumerable.Range(0, Largest + 1).Select(size => MerkleRoot.Of(Hashes[..size]))];

    public static Sha256Hash Root(int size) => Roots[size];

    /// <summary>The hash with one bit of one byte changed.</summary>
    public static Sha256Hash Flip(Sha256Hash hash, int place, int bit = 0)
    {
        var bytes = hash.Bytes.ToArray();
        bytes[place] ^= (byte)(1 << bit);
        return new Sha256Hash(bytes);
    }
}
