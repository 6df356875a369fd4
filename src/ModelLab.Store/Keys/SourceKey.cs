using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;

namespace ModelLab.Store.Keys;

/// <summary>What a key is used for; each purpose has a key of its own, derived from the source's (HKDF, RFC 5869).</summary>
public enum KeyPurpose
{
    /// <summary>Chunks of the source; the nonce is the chunk's place.</summary>
    Chunks,

    /// <summary>Sealed parts of entries; nonces are random.</summary>
    SealedParts,

    /// <summary>Content kept under its hash; nonces are random.</summary>
    KeptContents,
}

/// <summary>The 32 bytes under which everything of one source is encrypted (AES-256-GCM, NIST SP 800-38D).</summary>
public sealed class SourceKey
{
    /// <summary>Bytes of a key.</summary>
    public const int Length = 32;

    /// <summary>Bytes of a nonce.</summary>
    public const int NonceLength = 12;

    /// <summary>Bytes of a tag.</summary>
    public const int TagLength = 16;

    private readonly byte[] key;
    private readonly byte[]?[] derived = new byte[3][];

    /// <summary>Takes the bytes of a key.</summary>
    public SourceKey(byte[] key)
    {
        if (key.Length != Length)
        {
            throw new ArgumentException($"A source key has {Length} bytes, not {key.Length}.", nameof(key));
        }

        this.key = key;
    }

    /// <summary>The nonce of a place; no two places of one source share it.</summary>
    public static byte[] NonceOf(int index)
    {
        var nonce = new byte[NonceLength];
        BinaryPrimitives.WriteInt32BigEndian(nonce.AsSpan(NonceLength - sizeof(int)), index);
        return nonce;
    }

    /// <summary>Encrypts; the tag is put at the end.</summary>
    /// <param name="purpose">Chooses the derived key.</param>
    /// <param name="nonce">12 bytes, never used twice with a purpose of this key.</param>
    /// <param name="place">Where the ciphertext belongs; not secret, but it cannot be moved elsewhere.</param>
    /// <param name="plain">The content.</param>
    public byte[] Encrypt(KeyPurpose purpose, byte[] nonce, string place, ReadOnlySpan<byte> plain)
    {
        var result = new byte[plain.Length + TagLength];
        using var cipher = new AesGcm(KeyOf(purpose), TagLength);
        cipher.Encrypt(nonce, plain, result.AsSpan(0, plain.Length), result.AsSpan(plain.Length), Encoding.UTF8.GetBytes(place));
        return result;
    }

    /// <summary>Decrypts what <see cref="Encrypt"/> gave.</summary>
    /// <exception cref="AuthenticationTagMismatchException">Key, nonce, place or ciphertext is not the one of the encryption.</exception>
    public byte[] Decrypt(KeyPurpose purpose, byte[] nonce, string place, ReadOnlySpan<byte> ciphertext)
    {
        if (ciphertext.Length < TagLength || nonce.Length != NonceLength)
        {
            throw new AuthenticationTagMismatchException();
        }

        var plain = new byte[ciphertext.Length - TagLength];
        using var cipher = new AesGcm(KeyOf(purpose), TagLength);
        cipher.Decrypt(nonce, ciphertext[..plain.Length], ciphertext[plain.Length..], plain, Encoding.UTF8.GetBytes(place));
        return plain;
    }

    private byte[] KeyOf(KeyPurpose purpose) =>
        derived[(int)purpose] ??= HKDF.DeriveKey(HashAlgorithmName.SHA256, key, Length, info: Encoding.ASCII.GetBytes(purpose switch
        {
            KeyPurpose.Chunks => "modellab source chunks 1",
            KeyPurpose.SealedParts => "modellab sealed parts 1",
            KeyPurpose.KeptContents => "modellab kept contents 1",
            _ => throw new ArgumentOutOfRangeException(nameof(purpose)),
        }));
}
