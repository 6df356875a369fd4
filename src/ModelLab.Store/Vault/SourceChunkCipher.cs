using System.Security.Cryptography;
using ModelLab.Store.Keys;

namespace ModelLab.Store.Vault;

/// <summary>Chunks of a source as ciphertext. Each is bound to its source and place and to being the last or not, so that none can be swapped, dropped or cut off.</summary>
internal static class SourceChunkCipher
{
    /// <summary>Bytes of a source in one chunk.</summary>
    public const int PlainLength = 1 << 20;

    public static SourceChunkRow Encrypt(SourceKey key, string projectId, string sourceId, int index, bool last, ReadOnlySpan<byte> plain) => new()
    {
        ProjectId = projectId,
        SourceId = sourceId,
        Index = index,
        Ciphertext = key.Encrypt(KeyPurpose.Chunks, SourceKey.NonceOf(index), Place(projectId, sourceId, index, last), ContentPacking.Pack(plain)),
    };

    /// <exception cref="VaultDamagedException">The chunk is not the one that was stored at this place.</exception>
    public static byte[] Decrypt(SourceKey key, string projectId, string sourceId, int index, bool last, byte[] ciphertext)
    {
        try
        {
            return ContentPacking.Unpack(key.Decrypt(KeyPurpose.Chunks, SourceKey.NonceOf(index), Place(projectId, sourceId, index, last), ciphertext));
        }
        catch (Exception e) when (e is CryptographicException or InvalidDataException)
        {
            throw new VaultDamagedException($"Chunk {index} of source {sourceId} is not what was stored.", e);
        }
    }

    private static string Place(string projectId, string sourceId, int index, bool last) =>
        FormattableString.Invariant($"{projectId}|{sourceId}|{index}|{(last ? "last" : "more")}");
}
