using System.Security.Cryptography;

namespace ModelLab.Ledger.Receipts;

/// <summary>
/// The public half of a server's signing key: an elliptic curve key on P-256 (FIPS 186-5, SP 800-186) as
/// SubjectPublicKeyInfo (RFC 5480) with its point uncompressed. It is named by the SHA-256 of those bytes.
/// </summary>
public sealed class ReceiptKey : IEquatable<ReceiptKey>
{
    /// <summary>
    /// SEQUENCE { SEQUENCE { id-ecPublicKey, prime256v1 }, BIT STRING { 04 … } } up to the point's coordinates
    /// (RFC 5480 sections 2.1.1 and 2.2; SEC 1 section 2.3.3).
    /// </summary>
    private static readonly byte[] Prefix = Convert.FromHexString("3059301306072A8648CE3D020106082A8648CE3D03010703420004");

    private readonly byte[] publicKeyInfo;

    private ReceiptKey(byte[] publicKeyInfo)
    {
        this.publicKeyInfo = publicKeyInfo;
        Fingerprint = Sha256Hash.Of(publicKeyInfo);
    }

    /// <summary>SubjectPublicKeyInfo, DER.</summary>
    public ReadOnlySpan<byte> PublicKeyInfo => publicKeyInfo;

    /// <summary>SHA-256 of <see cref="PublicKeyInfo"/>: the key's id, to be published and compared.</summary>
    public Sha256Hash Fingerprint { get; }

    /// <summary>Takes the public half of a key.</summary>
    /// <exception cref="ArgumentException">No key on P-256.</exception>
    public static ReceiptKey Of(ECDsa key)
    {
        try
        {
            return Parse(key.ExportSubjectPublicKeyInfo());
        }
        catch (FormatException e)
        {
            throw new ArgumentException("Receipts are signed with an elliptic curve key on P-256.", nameof(key), e);
        }
    }

    /// <summary>Reads SubjectPublicKeyInfo.</summary>
    /// <exception cref="FormatException">Not the DER form of a key on P-256 with its point uncompressed.</exception>
    public static ReceiptKey Parse(ReadOnlySpan<byte> publicKeyInfo)
    {
        // All such keys begin alike and are of one length; nothing else is given to the platform's reader.
        if (publicKeyInfo.Length != Prefix.Length + 64 || !publicKeyInfo.StartsWith(Prefix))
        {
            throw new FormatException("The public key is not a P-256 key as an uncompressed SubjectPublicKeyInfo.");
        }

        using var key = ECDsa.Create();
        try
        {
            key.ImportSubjectPublicKeyInfo(publicKeyInfo, out _);
            return new ReceiptKey(publicKeyInfo.ToArray());
        }
        catch (CryptographicException e)
        {
            throw new FormatException("The public key is no point of the curve P-256.", e);
        }
    }

    /// <summary>Whether a signature over data (ECDSA with SHA-256, r ‖ s of 32 bytes each) was made with this key.</summary>
    public bool Verifies(ReadOnlySpan<byte> data, ReadOnlySpan<byte> signature)
    {
        using var key = ECDsa.Create();
        key.ImportSubjectPublicKeyInfo(publicKeyInfo, out _);
        return key.VerifyData(data, signature, HashAlgorithmName.SHA256, DSASignatureFormat.IeeeP1363FixedFieldConcatenation);
    }

    /// <inheritdoc/>
    public bool Equals(ReceiptKey? other) => other is not null && Fingerprint == other.Fingerprint;

    /// <inheritdoc/>
    public override bool Equals(object? obj) => Equals(obj as ReceiptKey);

    /// <inheritdoc/>
    public override int GetHashCode() => Fingerprint.GetHashCode();
}
