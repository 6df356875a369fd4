using System.Security.Cryptography;
using System.Text.Json;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Canonical;
using ModelLab.Ledger.Entries;
using ModelLab.Store.Keys;

namespace ModelLab.Store.Ledgers;

/// <summary>Sealed parts as ciphertext: salt, then the content in canonical form; bound to ledger and entry number.</summary>
internal static class SealedPartCipher
{
    public static byte[] Encrypt(SourceKey key, string ledgerId, long entryNumber, byte[] nonce, SealedContent content) =>
        key.Encrypt(KeyPurpose.SealedParts, nonce, Place(ledgerId, entryNumber), [.. content.Salt, .. CanonicalJson.Serialise(content.Content)]);

    /// <summary>The content; null where it is not what the entry's commitment binds.</summary>
    public static JsonObject? Open(SourceKey key, SealedPartRow row, SealedReference reference)
    {
        try
        {
            var plain = key.Decrypt(KeyPurpose.SealedParts, row.Nonce, Place(row.LedgerId, row.EntryNumber), row.Ciphertext);
            if (plain.Length < SealedCommitment.SaltLength || JsonNode.Parse(plain.AsSpan(SealedCommitment.SaltLength)) is not JsonObject content)
            {
                return null;
            }

            var opened = new SealedContent(row.SourceId, plain[..SealedCommitment.SaltLength], content);
            return SealedCommitment.Matches(reference, opened) ? content : null;
        }
        catch (Exception e) when (e is CryptographicException or JsonException)
        {
            return null;
        }
    }

    private static string Place(string ledgerId, long entryNumber) => FormattableString.Invariant($"{ledgerId}|{entryNumber}");
}
