using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Receipts;

namespace ModelLab.Ledger.Verification;

/// <summary>What a verification found.</summary>
/// <param name="Ok">Nothing wrong.</param>
/// <param name="Entries">Entries read.</param>
/// <param name="Head">Head computed from the entries up to the first bad one.</param>
/// <param name="FirstBad">
/// Number of the first bad entry (where it stands, from 1). Null for none, and where only a head or a receipt tells that
/// the entries are not what they were, without telling which.
/// </param>
/// <param name="Problem">What is wrong, in one sentence, or null.</param>
public sealed record VerificationResult(bool Ok, long Entries, LedgerHead Head, long? FirstBad, string? Problem)
{
    /// <summary>
    /// How often an entry is dated before the one it follows. No fault: numbers and chain give the order, and a server's
    /// clock may be set back; but worth telling.
    /// </summary>
    public long StepsBackInTime { get; init; }

    /// <summary>Number of the first entry dated before the one it follows, or null.</summary>
    public long? FirstStepBackInTime { get; init; }

    /// <summary>What was found about each receipt given, in the order of the entries they count.</summary>
    public IReadOnlyList<ReceiptFinding> Receipts { get; init; } = [];
}

/// <summary>A receipt held against a ledger.</summary>
/// <param name="Receipt">The receipt.</param>
/// <param name="Check">What was found.</param>
public sealed record ReceiptFinding(Receipt Receipt, ReceiptCheck Check);
