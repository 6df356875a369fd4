using System.Security.Cryptography;
using System.Text;

namespace ModelLab.Store.Keys;

/// <summary>The key under which the sources' keys are wrapped. It lies in a file of its own: 64 hexadecimal digits.</summary>
public sealed class MasterKey
{
    private const int Length = 32;

    private readonly byte[] key;

    private MasterKey(byte[] key) => this.key = key;

    /// <summary>Names the key without telling it: stored beside what it wraps, so that a wrong one is noticed.</summary>
    public string Fingerprint => Convert.ToHexStringLower(HMACSHA256.HashData(key, "modellab master key fingerprint 1"u8));

    /// <summary>Makes a new key and writes its file.</summary>
    /// <exception cref="IOException">There is such a file already, or it cannot be written.</exception>
    public static MasterKey Create(string path)
    {
        var key = RandomNumberGenerator.GetBytes(Length);
        PrivateFiles.WriteNew(path, Encoding.ASCII.GetBytes(Convert.ToHexStringLower(key) + "\n"));
        return new MasterKey(key);
    }

    /// <summary>Reads the file.</summary>
    /// <exception cref="KeysUnusableException">There is none, or it holds something else.</exception>
    public static MasterKey Read(string path)
    {
        if (!File.Exists(path))
        {
            throw new KeysUnusableException($"The master key {path} is missing. Put it back from the backup of the keys; without it no source can be read.");
        }

        var text = File.ReadAllText(path).Trim();
        return text.Length == 2 * Length && text.All(char.IsAsciiHexDigit)
            ? new MasterKey(Convert.FromHexString(text))
            : throw new KeysUnusableException($"The master key {path} does not hold {2 * Length} hexadecimal digits. Put it back from the backup of the keys.");
    }

    /// <summary>Encrypts a source's key; nonce first, tag last.</summary>
    public byte[] Wrap(ReadOnlySpan<byte> sourceKey, string projectId, string sourceId)
    {
        var wrapped = new byte[SourceKey.NonceLength + sourceKey.Length + SourceKey.TagLength];
        RandomNumberGenerator.Fill(wrapped.AsSpan(0, SourceKey.NonceLength));
        using var cipher = new AesGcm(key, SourceKey.TagLength);
        cipher.Encrypt(
            wrapped.AsSpan(0, SourceKey.NonceLength), sourceKey, wrapped.AsSpan(SourceKey.NonceLength, sourceKey.Length),
            wrapped.AsSpan(SourceKey.NonceLength + sourceKey.Length), Place(projectId, sourceId));
        return wrapped;
    }

    /// <summary>Decrypts a source's key.</summary>
    /// <exception cref="KeysUnusableException">It was wrapped under another master key, for another source, or changed.</exception>
    public byte[] Unwrap(ReadOnlySpan<byte> wrapped, string projectId, string sourceId)
    {
        if (wrapped.Length != SourceKey.NonceLength + SourceKey.Length + SourceKey.TagLength)
        {
            throw new KeysUnusableException($"The key of source {sourceId} is damaged. Restore the backup of the keys.");
        }

        var sourceKey = new byte[SourceKey.Length];
        using var cipher = new AesGcm(key, SourceKey.TagLength);
        try
        {
            cipher.Decrypt(
                wrapped[..SourceKey.NonceLength], wrapped.Slice(SourceKey.NonceLength, SourceKey.Length),
                wrapped[(SourceKey.NonceLength + SourceKey.Length)..], sourceKey, Place(projectId, sourceId));
        }
        catch (CryptographicException e)
        {
            throw new KeysUnusableException($"The key of source {sourceId} does not open with this master key. Restore master key and keys from the same backup.", e);
        }

        return sourceKey;
    }

    private static byte[] Place(string projectId, string sourceId) => Encoding.UTF8.GetBytes($"{projectId}|{sourceId}");
}

/// <summary>The keys cannot be used as they lie there.</summary>
public sealed class KeysUnusableException(string message, Exception? inner = null) : Exception(message, inner);
