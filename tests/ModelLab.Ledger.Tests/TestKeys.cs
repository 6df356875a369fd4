using System.Security.Cryptography;
using ModelLab.Ledger.Receipts;

namespace ModelLab.Ledger.Tests;

/// <summary>Signing keys made for one run of the tests, and the receipt over the small ledger.</summary>
internal static class TestKeys
{
    public static readonly DateTimeOffset SignedAt = new(2026, 3, 1, 12, 0, 0, TimeSpan.Zero);

    public static ReceiptSigner Signer { get; } = new(ECDsa.Create(ECCurve.NamedCurves.nistP256));

    public static ReceiptSigner Stranger { get; } = new(ECDsa.Create(ECCurve.NamedCurves.nistP256));

    public static ReceiptVerifier Verifier { get; } = new([Signer.PublicKey.Fingerprint]);

    public static Receipt Receipt { get; } = Signer.Sign(SmallLedger.Batch.Head, SignedAt);
}
