using ModelLab.Ledger.Entries;

namespace ModelLab.Ledger.Verification;

/// <summary>What a verification found.</summary>
/// <param name="Ok">Nothing wrong.</param>
/// <param name="Entries">Entries read.</param>
/// <param name="Head">Head computed from the entries up to the first bad one.</param>
/// <param name="FirstBad">Number of the first bad entry (where it stands, from 1), or null.</param>
/// <param name="Problem">What is wrong with it, in one sentence, or null.</param>
public sealed record VerificationResult(bool Ok, long Entries, LedgerHead Head, long? FirstBad, string? Problem);

/// <summary>Verifies stored bytes: form, numbers, chain, tree.</summary>
public sealed class LedgerVerifier
{
    /// <summary>Begins a verification of one ledger.</summary>
    public LedgerVerifier(string ledgerId) => _ = ledgerId;

    /// <summary>Takes the next entry's stored bytes. Goes on counting after a bad one, which is kept as the first.</summary>
    public void Add(ReadOnlyMemory<byte> canonicalBytes) => throw new NotImplementedException();

    /// <summary>Ends it: compares with the stored head, where one is given (catches a cut tail).</summary>
    public VerificationResult Finish(LedgerHead? storedHead = null) => throw new NotImplementedException();
}
