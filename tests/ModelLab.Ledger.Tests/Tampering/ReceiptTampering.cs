using System.Text;
using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Receipts;

namespace ModelLab.Ledger.Tests.Tampering;

/// <summary>The receipt over the small ledger altered in every byte, respelled, and put together anew from other parts.</summary>
internal static class ReceiptTampering
{
    private static readonly byte[] File = TestKeys.Receipt.Write();

    public static Tally Bytes()
    {
        var tally = new Tally("bytes of receipts");
        tally.MustPass(Accepted(File), "receipt");
        for (var place = 0; place < File.Length; place++)
        {
            for (var bit = 0; bit < 8; bit++)
            {
                var altered = (byte[])File.Clone();
                altered[place] ^= (byte)(1 << bit);
                tally.MustBeFound(!Accepted(altered), $"byte {place}, bit {bit}");
            }

            tally.MustBeFound(!Accepted(File[..place]), $"cut to {place} bytes");
            tally.MustBeFound(!Accepted([.. File[..place], .. File[(place + 1)..]]), $"byte {place} left out");
        }

        foreach (var more in "\0 \n}0")
        {
            tally.MustBeFound(!Accepted([.. File, (byte)more]), $"{(int)more} appended");
            tally.MustBeFound(!Accepted([(byte)more, .. File]), $"{(int)more} put first");
        }

        return tally;
    }

    public static Tally Parts()
    {
        var tally = new Tally("parts of receipts");
        var receipt = TestKeys.Receipt;
        var stranger = TestKeys.Stranger.Sign(SmallLedger.Batch.Head, TestKeys.SignedAt);
        var other = TestKeys.Signer.Sign(SmallLedger.Form("another-ledger").Head, TestKeys.SignedAt);
        tally.MustPass(Accepted(receipt.Write()), "receipt");
        tally.MustPass(Accepted(TestKeys.Signer.Sign(SmallLedger.Batch.Head, TestKeys.SignedAt).Write()), "second receipt");
        Receipt[] forged =
        [
            stranger,
            other,
            receipt with { Key = stranger.Key },
            receipt with { Signature = stranger.Signature },
            receipt with { Signature = other.Signature },
            receipt with { Signature = new byte[Receipt.SignatureLength] },
            receipt with { Signature = receipt.Signature[..63] },
            receipt with { Signature = (byte[])[.. receipt.Signature.Span, 0] },
            receipt with { LedgerId = "another-ledger" },
            receipt with { LedgerId = "" },
            receipt with { Count = 11 },
            receipt with { Count = 13 },
            receipt with { Count = 0 },
            receipt with { Count = -12 },
            receipt with { Root = other.Root },
            receipt with { HeadHash = other.HeadHash },
            receipt with { HeadHash = receipt.Root, Root = receipt.HeadHash },
            receipt with { At = receipt.At.AddTicks(10) },
            other with { LedgerId = SmallLedger.Id },
        ];
        for (var i = 0; i < forged.Length; i++)
        {
            tally.MustBeFound(!Accepted(forged[i].Write()), $"forgery {i}");
            tally.MustBeFound(!Fits(forged[i]), $"forgery {i} not written");
        }

        foreach (var (text, how) in Respelled(Encoding.UTF8.GetString(File)))
        {
            tally.MustBeFound(!Accepted(Encoding.UTF8.GetBytes(text)), how);
        }

        return tally;
    }

    /// <summary>Genuine receipts of the ledger's whole growth: each fits the ledger, none fits one rewritten before it.</summary>
    public static Tally Growth()
    {
        var tally = new Tally("receipts of earlier sizes");
        var receipts = new List<Receipt>();
        var head = LedgerHead.Empty(SmallLedger.Id);
        foreach (var draft in SmallLedger.Drafts())
        {
            head = LedgerAppender.Append(head, [draft]).Head;
            receipts.Add(TestKeys.Signer.Sign(head, TestKeys.SignedAt));
        }

        byte[][] entries = [.. SmallLedger.Batch.Entries.Select(e => e.CanonicalBytes.ToArray())];
        tally.MustPass(LedgerTampering.Verify(entries, SmallLedger.Batch.Head, [.. receipts]).Ok, "ledger with receipts of all sizes");
        for (var k = 0; k < entries.Length; k++)
        {
            tally.MustPass(LedgerTampering.Verify(entries, null, receipts[k]).Ok, $"receipt {k + 1}");
            var drafts = SmallLedger.Drafts().ToArray();
            drafts[k] = drafts[k] with { Reason = "Rewritten" };
            byte[][] rewritten = [.. LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), drafts).Entries.Select(e => e.CanonicalBytes.ToArray())];
            for (var r = 0; r < receipts.Count; r++)
            {
                var result = LedgerTampering.Verify(rewritten, null, receipts[r]);
                if (r < k)
                {
                    tally.MustPass(result.Ok, $"receipt {r + 1} of what stands before the rewriting from {k + 1}");
                }
                else
                {
                    tally.MustBeFound(!result.Ok, $"rewriting from {k + 1} by receipt {r + 1}");
                }

                if (k <= r)
                {
                    tally.MustBeFound(!LedgerTampering.Verify(entries[..k], null, receipts[r]).Ok, $"cut to {k} entries by receipt {r + 1}");
                }
            }
        }

        return tally;
    }

    private static IEnumerable<(string Text, string How)> Respelled(string file)
    {
        yield return (file.Replace(",\"count\"", ", \"count\"", StringComparison.Ordinal), "a blank");
        yield return (file.Replace("\"version\":1", "\"version\":2", StringComparison.Ordinal), "version 2");
        yield return (file.Replace("\"version\":1", "\"version\":\"1\"", StringComparison.Ordinal), "version as text");
        yield return (file.Replace(",\"version\":1", "", StringComparison.Ordinal), "no version");
        yield return (file.Replace(Receipt.Algorithm, "none", StringComparison.Ordinal), "algorithm none");
        yield return (file.Replace("\"count\":12", "\"count\":12.5", StringComparison.Ordinal), "count 12.5");
        yield return (file.Replace("\"count\":12", "\"count\":\"12\"", StringComparison.Ordinal), "count as text");
        yield return (file.Replace("\"count\":12", "\"count\":null", StringComparison.Ordinal), "count null");
        yield return (file.Replace("\"count\":12", "\"count\":1e+21", StringComparison.Ordinal), "count beyond all");
        yield return (file.Replace("\"version\":1", "\"version\":1,\"z\":0", StringComparison.Ordinal), "a further member");
        yield return (file.Replace("==\"", "\"", StringComparison.Ordinal), "no padding");
        yield return (file.Replace("\"ledger\":\"", "\"ledger\":null,\"x\":\"", StringComparison.Ordinal), "no ledger");
        yield return ("[]", "an array");
        yield return ("null", "null");
        yield return ("{}", "an empty object");
        yield return ("", "nothing");
        yield return ($"\"{new string('a', Receipt.MaximumFileLength)}\"", "too long");
    }

    private static bool Accepted(byte[] file)
    {
        try
        {
            return Fits(Receipt.Parse(file));
        }
        catch (FormatException)
        {
            return false;
        }
    }

    private static bool Fits(Receipt receipt) =>
        TestKeys.Verifier.CheckEntries(receipt, SmallLedger.Id, [.. SmallLedger.Batch.Entries.Select(e => e.Hash)]).Ok;
}
