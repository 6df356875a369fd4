using System.Security.Cryptography;
using System.Text;
using ModelLab.Ledger.Receipts;
using ModelLab.Projects.Records;
using ModelLab.Projects.Tests.Hosting;

namespace ModelLab.Projects.Tests;

public sealed class VerificationTests : IDisposable
{
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Theory]
    [InlineData(1)]
    [InlineData(3)]
    [InlineData(4)]
    public async Task The_changed_entry_is_named_and_not_the_one_after_it(long number)
    {
        var project = await bench.ProjectAsync();
        var bytes = Encoding.UTF8.GetString(bench.Store.Entries(project)[(int)number - 1]);
        Assert.True((await bench.Get<ReadLedger>().VerifyAsync(Bench.Analyst, project, Bench.Stop)).Ok);
        bench.Store.ReplaceEntry(project, number, Encoding.UTF8.GetBytes(bytes.Replace("The owner", "The other", StringComparison.Ordinal)));
        var result = await bench.Get<ReadLedger>().VerifyAsync(Bench.Analyst, project, Bench.Stop);
        Assert.False(result.Ok);
        Assert.Equal(number, result.FirstBad);
        Assert.Contains("was changed", result.Problem, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_receipt_kept_elsewhere_still_fits_and_one_of_another_ledger_does_not()
    {
        var project = await bench.ProjectAsync();
        var other = await bench.ProjectAsync();
        using var key = ECDsa.Create(ECCurve.NamedCurves.nistP256);
        var signer = new ReceiptSigner(key);
        var ledger = bench.Get<ReadLedger>();
        var kept = signer.Sign(await ledger.HeadAsync(Bench.Analyst, project, Bench.Stop), bench.Clock.GetUtcNow());
        var strange = signer.Sign(await ledger.HeadAsync(Bench.Analyst, other, Bench.Stop), bench.Clock.GetUtcNow());
        await bench.SourceAsync(project, "a,b\n1.5,2.5\n2.5,3.5\n");
        var verifier = new ReceiptVerifier([ReceiptKey.Of(key).Fingerprint]);
        Assert.True((await ledger.VerifyAsync(Bench.Analyst, project, [kept], verifier, Bench.Stop)).Ok);
        var result = await ledger.VerifyAsync(Bench.Analyst, project, [kept, strange], verifier, Bench.Stop);
        Assert.False(result.Ok);
        Assert.Equal([true, false], result.Receipts.Select(r => r.Check.Ok));
        using var stranger = ECDsa.Create(ECCurve.NamedCurves.nistP256);
        Assert.False((await ledger.VerifyAsync(Bench.Analyst, project, [kept], new ReceiptVerifier([ReceiptKey.Of(stranger).Fingerprint]), Bench.Stop)).Ok);
    }
}
