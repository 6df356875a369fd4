using System.Text.Json.Nodes;

namespace ModelLab.Ledger.Entries;

/// <summary>Who acts.</summary>
/// <param name="PersonId">Stable id of the person on the server.</param>
/// <param name="Name">The name as it was when acting.</param>
public sealed record Author(string PersonId, string Name);

/// <summary>What is copied from a source and so may not stand in the open: the plain content and its salt, both secret.</summary>
/// <param name="SourceId">The source under whose key the ciphertext is kept.</param>
/// <param name="Salt">32 random bytes.</param>
/// <param name="Content">The content.</param>
public sealed record SealedContent(string SourceId, byte[] Salt, JsonObject Content);

/// <summary>Names a sealed part inside an entry: SHA-256 over domain tag, salt and canonical content.</summary>
/// <param name="SourceId">The source under whose key the ciphertext is kept.</param>
/// <param name="Commitment">Salted commitment.</param>
public sealed record SealedReference(string SourceId, Sha256Hash Commitment);

/// <summary>An act to be recorded. Number, hash and previous hash are given when it is appended.</summary>
/// <param name="Kind">Versioned name, e.g. <c>revision/1</c>.</param>
/// <param name="At">When, UTC.</param>
/// <param name="By">Who.</param>
/// <param name="Reason">Why; null where the act needs none.</param>
/// <param name="Body">What: plain JSON, numbers finite.</param>
/// <param name="Sealed">What was copied from a source, or null.</param>
public sealed record EntryDraft(string Kind, DateTimeOffset At, Author By, string? Reason, JsonObject Body, SealedContent? Sealed = null);

/// <summary>An entry as stored. <see cref="CanonicalBytes"/> is what is hashed; all else is read from it.</summary>
public sealed record LedgerEntry(
    string LedgerId, long Number, string Kind, DateTimeOffset At, Author By, string? Reason, JsonObject Body,
    SealedReference? Sealed, Sha256Hash Previous, Sha256Hash Hash, ReadOnlyMemory<byte> CanonicalBytes)
{
    /// <summary>Reads stored bytes; unknown kinds are kept as they are.</summary>
    /// <exception cref="FormatException">The bytes are no entry, or not in canonical form.</exception>
    public static LedgerEntry Parse(ReadOnlyMemory<byte> canonicalBytes) => throw new NotImplementedException();
}
