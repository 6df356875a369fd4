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
/// <param name="Commitment">Salted commitment, see <see cref="SealedCommitment"/>.</param>
public sealed record SealedReference(string SourceId, Sha256Hash Commitment);

/// <summary>An act to be recorded. Number, hash and previous hash are given when it is appended.</summary>
/// <param name="Kind">Versioned name, e.g. <c>revision/1</c>.</param>
/// <param name="At">When; stored in UTC to the microsecond.</param>
/// <param name="By">Who.</param>
/// <param name="Reason">Why; null where the act needs none. Not blank.</param>
/// <param name="Body">What: plain JSON, numbers finite, integers beyond 2^53 as text.</param>
/// <param name="Sealed">What was copied from a source, or null.</param>
public sealed record EntryDraft(string Kind, DateTimeOffset At, Author By, string? Reason, JsonObject Body, SealedContent? Sealed = null);
