using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Receipts;
using ModelLab.Ledger.Verification;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;

namespace ModelLab.Projects.Records;

/// <summary>Some entries of a ledger.</summary>
/// <param name="Entries">In order.</param>
/// <param name="Count">Entries of the whole ledger.</param>
/// <param name="Next">Number from which to go on, or null at the end.</param>
public sealed record LedgerPage(IReadOnlyList<LedgerEntry> Entries, long Count, long? Next);

/// <summary>Shows and verifies a project's ledger.</summary>
public sealed class ReadLedger(ProjectGate gate, IProjectStore store)
{
    /// <summary>Most entries in one page.</summary>
    public const int PageSize = 200;

    /// <summary>Entries from a number on.</summary>
    public async Task<LedgerPage> PageAsync(Caller caller, string projectId, long from, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        if (from < 1)
        {
            throw RefusedException.Invalid("Entries are numbered from 1.", "from");
        }

        var head = await store.HeadAsync(projectId, cancellation);
        var entries = new List<LedgerEntry>();
        await foreach (var bytes in store.EntriesAsync(projectId, from, cancellation))
        {
            entries.Add(LedgerEntry.Parse(bytes));
            if (entries.Count == PageSize)
            {
                break;
            }
        }

        var last = entries.Count == 0 ? head.Count : entries[^1].Number;
        return new LedgerPage(entries, head.Count, last < head.Count ? last + 1 : null);
    }

    /// <summary>Verifies every stored byte: form, numbers, chain, tree, and the head (a cut tail).</summary>
    public Task<VerificationResult> VerifyAsync(Caller caller, string projectId, CancellationToken cancellation) =>
        VerifyAsync(caller, projectId, [], new ReceiptVerifier(), cancellation);

    /// <summary>The same, compared with receipts kept elsewhere: what they saw must still stand there.</summary>
    public async Task<VerificationResult> VerifyAsync(
        Caller caller, string projectId, IReadOnlyList<Receipt> receipts, ReceiptVerifier receiptVerifier, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);

        // The head is read first: entries appended meanwhile come after it and are left to the next verification.
        var head = await store.HeadAsync(projectId, cancellation);
        var verifier = new LedgerVerifier(projectId, receipts, receiptVerifier);
        var taken = 0L;
        await foreach (var bytes in store.EntriesAsync(projectId, 1, cancellation))
        {
            if (taken++ == head.Count)
            {
                break;
            }

            verifier.Add(bytes);
        }

        var result = verifier.Finish(head);

        // A changed entry is noticed by the one after it. The hash that lies beside its bytes tells which of the two it was.
        var last = result.Head.Count;
        return !result.Ok && last > 0 && await store.StoredHashAsync(projectId, last, cancellation) is { } stored && stored != result.Head.LastHash
            ? result with { FirstBad = last, Problem = $"Entry {last} was changed: its bytes no longer have the hash that was stored beside them." }
            : result;
    }

    /// <summary>The head of the ledger, to be signed as a receipt.</summary>
    public async Task<LedgerHead> HeadAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        return await store.HeadAsync(projectId, cancellation);
    }
}
