using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;
using ModelLab.Store.Keys;

namespace ModelLab.Store.Ledgers;

/// <summary>Sealed parts as ciphertext: salt, then the content as JSON; bound to ledger and entry number.</summary>
internal static class SealedPartCipher
{
    private const int SaltLength = 32;

    public static byte[] Encrypt(SourceKey key, string ledgerId, long entryNumber, byte[] nonce, SealedContent content)
    {
        var json = System.Text.Encoding.UTF8.GetBytes(content.Content.ToJsonString());
        return key.Encrypt(KeyPurpose.SealedParts, nonce, Place(ledgerId, entryNumber), [.. content.Salt, .. json]);
    }

    /// <exception cref="System.Security.Cryptography.AuthenticationTagMismatchException">Ciphertext, place or key is another.</exception>
    public static SealedContent Decrypt(SourceKey key, SealedPartRow row)
    {
        var plain = key.Decrypt(KeyPurpose.SealedParts, row.Nonce, Place(row.LedgerId, row.EntryNumber), row.Ciphertext);
        var content = JsonNode.Parse(plain.AsSpan(SaltLength))!.AsObject();
        return new SealedContent(row.SourceId, plain[..SaltLength], content);
    }

    private static string Place(string ledgerId, long entryNumber) => FormattableString.Invariant($"{ledgerId}|{entryNumber}");
}
