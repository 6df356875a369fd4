using System.Security.Cryptography;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Canonical;

namespace ModelLab.Ledger.Entries;

/// <summary>
/// Binds an entry to content that may not stand in it: SHA-256(0x02 ‖ salt ‖ canonical content). The salt keeps
/// guessable values (a category, a name) from being found by trying; the first byte keeps a commitment apart from the
/// leaves (0x00) and nodes (0x01) of the Merkle tree.
/// </summary>
public static class SealedCommitment
{
    /// <summary>Bytes of a salt.</summary>
    public const int SaltLength = 32;

    private const byte DomainTag = 0x02;

    /// <summary>The commitment.</summary>
    /// <param name="salt">32 random bytes, used once.</param>
    /// <param name="content">The content.</param>
    /// <exception cref="ArgumentException">Salt of another length, or content that has no canonical form.</exception>
    public static Sha256Hash Of(ReadOnlySpan<byte> salt, JsonObject content)
    {
        if (salt.Length != SaltLength)
        {
            throw new ArgumentException($"A salt has {SaltLength} bytes, not {salt.Length}.", nameof(salt));
        }

        return Sha256Hash.Of([DomainTag, .. salt, .. CanonicalJson.Serialise(content)]);
    }

    /// <summary>Whether content opened from its ciphertext is what the entry was bound to.</summary>
    public static bool Matches(SealedReference reference, SealedContent opened) =>
        reference.SourceId == opened.SourceId
        && opened.Salt.Length == SaltLength
        && CryptographicOperations.FixedTimeEquals(reference.Commitment.Bytes, Of(opened.Salt, opened.Content).Bytes);
}
