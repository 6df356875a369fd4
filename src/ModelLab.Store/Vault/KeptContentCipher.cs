using System.Security.Cryptography;
using ModelLab.Ledger;
using ModelLab.Projects.Storage;
using ModelLab.Store.Keys;

namespace ModelLab.Store.Vault;

/// <summary>Kept content as ciphertext, bound to project, source and hash.</summary>
internal static class KeptContentCipher
{
    public static KeptContentRow Encrypt(SourceKey key, string projectId, KeptContent content)
    {
        if (Sha256Hash.Of(content.Plain) != content.Hash)
        {
            throw new ArgumentException("Kept content does not have the hash under which it is to be kept.", nameof(content));
        }

        var nonce = RandomNumberGenerator.GetBytes(SourceKey.NonceLength);
        return new KeptContentRow
        {
            ProjectId = projectId,
            Hash = content.Hash,
            SourceId = content.SourceId,
            Nonce = nonce,
            Ciphertext = key.Encrypt(KeyPurpose.KeptContents, nonce, Place(projectId, content.SourceId, content.Hash), ContentPacking.Pack(content.Plain)),
        };
    }

    /// <exception cref="VaultDamagedException">The stored content is not what was kept.</exception>
    public static byte[] Decrypt(SourceKey key, KeptContentRow row)
    {
        try
        {
            var packed = key.Decrypt(KeyPurpose.KeptContents, row.Nonce, Place(row.ProjectId, row.SourceId, row.Hash), row.Ciphertext);
            var plain = ContentPacking.Unpack(packed);
            return Sha256Hash.Of(plain) == row.Hash ? plain : throw new InvalidDataException("The content has another hash.");
        }
        catch (Exception e) when (e is CryptographicException or InvalidDataException)
        {
            throw new VaultDamagedException($"Kept content {row.Hash} is not what was stored.", e);
        }
    }

    private static string Place(string projectId, string sourceId, Sha256Hash hash) => $"{projectId}|{sourceId}|{hash}";
}
