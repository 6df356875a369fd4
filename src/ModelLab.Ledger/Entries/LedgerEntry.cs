using System.Text.Json.Nodes;
using ModelLab.Ledger.Canonical;
using ModelLab.Ledger.Merkle;

namespace ModelLab.Ledger.Entries;

/// <summary>An entry as stored. <see cref="CanonicalBytes"/> is what is hashed; all else is read from it.</summary>
/// <param name="LedgerId">Id of the project, or <c>server</c>.</param>
/// <param name="Number">From 1 without gaps.</param>
/// <param name="Kind">Versioned name, e.g. <c>revision/1</c>.</param>
/// <param name="At">When, UTC, to the microsecond.</param>
/// <param name="By">Who.</param>
/// <param name="Reason">Why, or null.</param>
/// <param name="Body">What. A copy of the entry's own: altering it alters no stored byte.</param>
/// <param name="Sealed">Names the sealed part, or null.</param>
/// <param name="Previous">Hash of the entry before; zero for the first.</param>
/// <param name="Hash">
/// SHA-256(0x00 ‖ <paramref name="CanonicalBytes"/>): the leaf hash of RFC 9162, so that one value serves as the link of
/// the chain and as the leaf of the Merkle tree.
/// </param>
/// <param name="CanonicalBytes">The entry in canonical JSON (RFC 8785).</param>
public sealed record LedgerEntry(
    string LedgerId, long Number, string Kind, DateTimeOffset At, Author By, string? Reason, JsonObject Body,
    SealedReference? Sealed, Sha256Hash Previous, Sha256Hash Hash, ReadOnlyMemory<byte> CanonicalBytes)
{
    /// <summary>Reads stored bytes; unknown kinds are kept as they are.</summary>
    /// <param name="canonicalBytes">The bytes, kept and not copied: they must not be altered afterwards.</param>
    /// <exception cref="FormatException">The bytes are no entry, or not in canonical form.</exception>
    public static LedgerEntry Parse(ReadOnlyMemory<byte> canonicalBytes)
    {
        var bytes = canonicalBytes.Span;
        var envelope = EntryEnvelope.Read(bytes);
        var body = CanonicalJson.Read(bytes[envelope.BodyStart..envelope.BodyEnd])!.AsObject();
        return new LedgerEntry(
            envelope.LedgerId, envelope.Number, envelope.Kind, envelope.At, envelope.By, envelope.Reason, body,
            envelope.Sealed, envelope.Previous, MerkleHash.Leaf(bytes), canonicalBytes);
    }

    /// <summary>Two entries are equal when their bytes are.</summary>
    public bool Equals(LedgerEntry? other) =>
        other is not null && CanonicalBytes.Span.SequenceEqual(other.CanonicalBytes.Span);

    /// <inheritdoc/>
    public override int GetHashCode() => Hash.GetHashCode();
}
