using System.Security.Cryptography;

namespace ModelLab.Ledger;

/// <summary>A SHA-256 value; its text is 64 lower-case hexadecimal digits.</summary>
public readonly struct Sha256Hash : IEquatable<Sha256Hash>
{
    private static readonly byte[] AllZero = new byte[SHA256.HashSizeInBytes];

    private readonly byte[]? bytes;

    /// <summary>Takes 32 bytes.</summary>
    /// <exception cref="ArgumentException">Another number of bytes.</exception>
    public Sha256Hash(ReadOnlySpan<byte> value)
    {
        if (value.Length != SHA256.HashSizeInBytes)
        {
            throw new ArgumentException("A SHA-256 value has 32 bytes.", nameof(value));
        }

        bytes = value.ToArray();
    }

    private Sha256Hash(byte[] owned) => bytes = owned;

    /// <summary>All zero: what stands before the first entry.</summary>
    public static Sha256Hash Zero => default;

    /// <summary>The 32 bytes.</summary>
    public ReadOnlySpan<byte> Bytes => bytes ?? AllZero;

    /// <summary>Hashes data as they are (no domain tag).</summary>
    public static Sha256Hash Of(ReadOnlySpan<byte> data) => new(SHA256.HashData(data));

    /// <summary>Reads 64 lower-case hexadecimal digits.</summary>
    /// <exception cref="FormatException">Anything else.</exception>
    public static Sha256Hash Parse(string text)
    {
        if (text.Length != 64 || !text.All(c => c is (>= '0' and <= '9') or (>= 'a' and <= 'f')))
        {
            throw new FormatException("A SHA-256 value is written as 64 lower-case hexadecimal digits.");
        }

        return new Sha256Hash(Convert.FromHexString(text));
    }

    /// <inheritdoc/>
    public bool Equals(Sha256Hash other) => Bytes.SequenceEqual(other.Bytes);

    /// <inheritdoc/>
    public override bool Equals(object? obj) => obj is Sha256Hash other && Equals(other);

    /// <inheritdoc/>
    public override int GetHashCode() => BitConverter.ToInt32(Bytes);

    /// <inheritdoc/>
    public override string ToString() => Convert.ToHexStringLower(Bytes);

    /// <summary>Equality of all bytes.</summary>
    public static bool operator ==(Sha256Hash left, Sha256Hash right) => left.Equals(right);

    /// <summary>Inequality.</summary>
    public static bool operator !=(Sha256Hash left, Sha256Hash right) => !left.Equals(right);
}
