using System.Text.Json.Nodes;
using ModelLab.Ledger;

namespace ModelLab.Projects.Storage;

/// <summary>A source as it lies in the vault.</summary>
/// <param name="Sha256">Of the bytes as received.</param>
/// <param name="Bytes">Their number.</param>
public sealed record StoredSource(Sha256Hash Sha256, long Bytes);

/// <summary>Sources as received, in encrypted chunks, each under its own key; and what was copied from them.</summary>
public interface ISourceVault
{
    /// <summary>Takes in a stream, compressing and encrypting chunk by chunk. It stays an orphan, and is swept later, until a batch adopts it.</summary>
    Task<StoredSource> StoreAsync(string projectId, string sourceId, Stream content, CancellationToken cancellation);

    /// <summary>Opens a source for reading from its beginning. Each call gives a fresh stream.</summary>
    /// <exception cref="RefusedException">Unknown (NotFound) or withdrawn (Withdrawn).</exception>
    Stream Open(string projectId, string sourceId);

    /// <summary>Removes a source that no batch adopted.</summary>
    Task DiscardAsync(string projectId, string sourceId, CancellationToken cancellation);

    /// <summary>The content of an entry's sealed part, checked against its commitment; null where the entry has none.</summary>
    /// <exception cref="RefusedException">The source was withdrawn, or the content does not match its commitment.</exception>
    Task<JsonObject?> UnsealAsync(string projectId, long entryNumber, CancellationToken cancellation);

    /// <summary>Content kept under its hash.</summary>
    /// <exception cref="RefusedException">There is none, or its source was withdrawn.</exception>
    Task<byte[]> ReadContentAsync(string projectId, Sha256Hash hash, CancellationToken cancellation);
}
