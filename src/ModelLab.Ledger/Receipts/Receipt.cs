using System.Text;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Canonical;

namespace ModelLab.Ledger.Receipts;

/// <summary>
/// A signed tree head (RFC 9162 section 4.10 has the idea, the form is our own): it names how many entries a ledger held
/// at a moment and the root over them, so that whoever keeps it can prove later that none of them was cut, changed or
/// moved. Its file is canonical JSON:
/// <c>algorithm, at, count, headHash, keyId, ledger, publicKey, root, signature, version</c>.
/// </summary>
/// <param name="LedgerId">Id of the project, or <c>server</c>.</param>
/// <param name="Count">Entries in the ledger, at least 1.</param>
/// <param name="Root">Root of the Merkle tree over them.</param>
/// <param name="HeadHash">Hash of the last of them.</param>
/// <param name="At">When it was signed, UTC, to the microsecond.</param>
/// <param name="Key">Public half of the signing key. Travels along; that it is the server's must be known from elsewhere.</param>
/// <param name="Signature">
/// ECDSA on P-256 with SHA-256 over <see cref="SignedBytes"/>, r ‖ s of 32 bytes each (IEEE P1363). The same statement
/// can bear several valid signatures: compare receipts by what they state.
/// </param>
public sealed record Receipt(
    string LedgerId, long Count, Sha256Hash Root, Sha256Hash HeadHash, DateTimeOffset At, ReceiptKey Key, ReadOnlyMemory<byte> Signature)
{
    /// <summary>Version of the form.</summary>
    public const int Version = 1;

    /// <summary>Name of the one algorithm of this version.</summary>
    public const string Algorithm = "ecdsa-p256-sha256-p1363";

    /// <summary>Bytes of a signature.</summary>
    public const int SignatureLength = 64;

    /// <summary>Most bytes a receipt's file has; what is longer is none.</summary>
    public const int MaximumFileLength = 4096;

    /// <summary>Goes before what is signed, so that a signature over anything else can never pass for one over a receipt.</summary>
    private static readonly byte[] Domain = Encoding.ASCII.GetBytes("ModelLab ledger receipt/1\n");

    /// <summary>What is signed: a domain text, then the file's members without the signature in canonical JSON.</summary>
    public byte[] SignedBytes() => [.. Domain, .. CanonicalJson.Serialise(Members())];

    /// <summary>The receipt as a file.</summary>
    public byte[] Write()
    {
        var members = Members();
        members["signature"] = Convert.ToBase64String(Signature.Span);
        return CanonicalJson.Serialise(members);
    }

    /// <summary>Reads a receipt's file and accepts no other form of it. The signature is not checked here.</summary>
    /// <exception cref="FormatException">Not a receipt, or in another form than <see cref="Write"/> gives.</exception>
    public static Receipt Parse(ReadOnlySpan<byte> file)
    {
        if (file.Length > MaximumFileLength)
        {
            throw new FormatException($"A receipt has at most {MaximumFileLength} bytes, not {file.Length}.");
        }

        try
        {
            return CanonicalJson.Parse(file) is JsonObject members && Read(members) is { } receipt && receipt.Write().AsSpan().SequenceEqual(file)
                ? receipt
                : throw new FormatException("This is no receipt of version 1: its members are not those of one.");
        }
        catch (Exception e) when (e is InvalidOperationException or ArgumentException)
        {
            throw new FormatException("This is no receipt of version 1: a member is missing or of the wrong kind.", e);
        }
    }

    /// <summary>Two receipts are equal when their files are.</summary>
    public bool Equals(Receipt? other) => other is not null && Write().AsSpan().SequenceEqual(other.Write());

    /// <inheritdoc/>
    public override int GetHashCode() => HashCode.Combine(LedgerId, Count, Root, Key);

    // Whatever is not read here (further members, another version, algorithm or key id) shows when the file is written again.
    private static Receipt Read(JsonObject members)
    {
        var receipt = new Receipt(
            Text(members, "ledger"),
            members["count"]?.GetValue<long>() ?? 0,
            Sha256Hash.Parse(Text(members, "root")),
            Sha256Hash.Parse(Text(members, "headHash")),
            LedgerTime.Parse(Text(members, "at")),
            ReceiptKey.Parse(Convert.FromBase64String(Text(members, "publicKey"))),
            Convert.FromBase64String(Text(members, "signature")));
        if (receipt.Count < 1 || string.IsNullOrWhiteSpace(receipt.LedgerId))
        {
            throw new FormatException("A receipt names a ledger and at least one entry.");
        }

        return receipt.Signature.Length == SignatureLength
            ? receipt
            : throw new FormatException($"A receipt's signature has {SignatureLength} bytes, not {receipt.Signature.Length}.");
    }

    private static string Text(JsonObject members, string name) =>
        members[name]?.GetValue<string>() ?? throw new FormatException($"A receipt has a member '{name}'.");

    private JsonObject Members() => new()
    {
        ["algorithm"] = Algorithm,
        ["at"] = LedgerTime.Text(At),
        ["count"] = Count,
        ["headHash"] = HeadHash.ToString(),
        ["keyId"] = Key.Fingerprint.ToString(),
        ["ledger"] = LedgerId,
        ["publicKey"] = Convert.ToBase64String(Key.PublicKeyInfo),
        ["root"] = Root.ToString(),
        ["version"] = Version,
    };
}
