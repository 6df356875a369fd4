using System.Buffers;
using System.Security.Cryptography;

namespace ModelLab.Ledger.Merkle;

/// <summary>
/// The hashes of a Merkle tree (RFC 9162 section 2.1.1). Leaves and nodes carry different first bytes, so that none can
/// be passed off as the other.
/// </summary>
public static class MerkleHash
{
    /// <summary>Root of the tree without leaves: SHA-256 of nothing.</summary>
    public static Sha256Hash Empty { get; } = Sha256Hash.Of([]);

    /// <summary>SHA-256(0x00 ‖ data).</summary>
    public static Sha256Hash Leaf(ReadOnlySpan<byte> data)
    {
        var rented = ArrayPool<byte>.Shared.Rent(data.Length + 1);
        try
        {
            rented[0] = 0x00;
            data.CopyTo(rented.AsSpan(1));
            return Sha256Hash.Of(rented.AsSpan(0, data.Length + 1));
        }
        finally
        {
            ArrayPool<byte>.Shared.Return(rented);
        }
    }

    /// <summary>SHA-256(0x01 ‖ left ‖ right).</summary>
    public static Sha256Hash Node(Sha256Hash left, Sha256Hash right)
    {
        Span<byte> data = stackalloc byte[1 + (2 * SHA256.HashSizeInBytes)];
        data[0] = 0x01;
        left.Bytes.CopyTo(data[1..]);
        right.Bytes.CopyTo(data[(1 + SHA256.HashSizeInBytes)..]);
        return Sha256Hash.Of(data);
    }
}
