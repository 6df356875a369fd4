using Xunit;

namespace ModelLab.Ledger.Tests.Tampering;

/// <summary>All that is altered is found, all that is untouched passes; each family lists its offenders.</summary>
public class TamperingTests(ITestOutputHelper output)
{
    private static readonly Lazy<Tally>[] Families =
    [
        new(LedgerTampering.Bits),
        new(LedgerTampering.Lengths),
        new(LedgerTampering.Spellings),
        new(LedgerTampering.Order),
        new(LedgerTampering.Rewriting),
        new(LedgerTampering.Heads),
        new(ReceiptTampering.Bytes),
        new(ReceiptTampering.Parts),
        new(ReceiptTampering.Growth),
        new(ProofTampering.Inclusion),
        new(ProofTampering.Consistency),
    ];

    [Fact]
    public void Bits_of_entries() => AllRight(0);

    [Fact]
    public void Lengths_of_entries() => AllRight(1);

    [Fact]
    public void Spellings_of_entries() => AllRight(2);

    [Fact]
    public void Order_of_entries() => AllRight(3);

    [Fact]
    public void Rewritten_ledgers() => AllRight(4);

    [Fact]
    public void Stored_heads() => AllRight(5);

    [Fact]
    public void Bytes_of_receipts() => AllRight(6);

    [Fact]
    public void Parts_of_receipts() => AllRight(7);

    [Fact]
    public void Receipts_of_earlier_sizes() => AllRight(8);

    [Fact]
    public void Inclusion_proofs() => AllRight(9);

    [Fact]
    public void Consistency_proofs() => AllRight(10);

    [Fact]
    public void Tampered_vectors_outnumber_valid_ones_by_far()
    {
        foreach (var family in Families)
        {
            output.WriteLine($"{family.Value.Family}: {family.Value.Valid} valid, {family.Value.Tampered} tampered");
        }

        var valid = Families.Sum(f => f.Value.Valid);
        var tampered = Families.Sum(f => f.Value.Tampered);
        output.WriteLine($"{valid} valid, {tampered} tampered");
        Assert.True(tampered > 10 * valid);
    }

    private static void AllRight(int family)
    {
        Assert.NotEqual(0, Families[family].Value.Tampered);
        Assert.Empty(Families[family].Value.Wrong);
    }
}
