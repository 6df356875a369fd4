using System.Security.Cryptography;
using ModelLab.Ledger.Entries;

namespace ModelLab.Ledger.Receipts;

/// <summary>Signs heads of ledgers with the server's key.</summary>
public sealed class ReceiptSigner
{
    private readonly ECDsa key;

    /// <summary>Takes the key pair; whoever made it disposes of it.</summary>
    /// <exception cref="ArgumentException">No key on P-256.</exception>
    public ReceiptSigner(ECDsa key)
    {
        this.key = key;
        PublicKey = ReceiptKey.Of(key);
    }

    /// <summary>The public half.</summary>
    public ReceiptKey PublicKey { get; }

    /// <summary>Signs a head.</summary>
    /// <param name="head">Where the ledger stands; with one entry at least.</param>
    /// <param name="at">When.</param>
    /// <exception cref="ArgumentException">The ledger has no entry yet, or the head contradicts itself.</exception>
    public Receipt Sign(LedgerHead head, DateTimeOffset at)
    {
        if (head.Count < 1)
        {
            throw new ArgumentException("A ledger without entries has nothing to sign.", nameof(head));
        }

        var statement = new Receipt(head.LedgerId, head.Count, head.Root, head.LastHash, LedgerTime.Parse(LedgerTime.Text(at)), PublicKey, default);
        return statement with
        {
            Signature = key.SignData(statement.SignedBytes(), HashAlgorithmName.SHA256, DSASignatureFormat.IeeeP1363FixedFieldConcatenation),
        };
    }
}
