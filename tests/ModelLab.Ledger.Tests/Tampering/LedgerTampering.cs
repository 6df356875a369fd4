using System.Text;
using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Receipts;
using ModelLab.Ledger.Verification;

namespace ModelLab.Ledger.Tests.Tampering;

/// <summary>The small ledger altered in every way that a forger without the server's key has, with a receipt kept apart.</summary>
internal static class LedgerTampering
{
    private static readonly AppendedBatch Batch = SmallLedger.Batch;
    private static readonly byte[][] Entries = [.. Batch.Entries.Select(e => e.CanonicalBytes.ToArray())];

    public static VerificationResult Verify(IEnumerable<byte[]> entries, LedgerHead? head, params Receipt[] receipts)
    {
        var verifier = new LedgerVerifier(SmallLedger.Id, receipts, TestKeys.Verifier);
        foreach (var entry in entries)
        {
            verifier.Add(entry);
        }

        return verifier.Finish(head);
    }

    /// <summary>Two bits of every byte of every entry, in turn all eight.</summary>
    public static Tally Bits()
    {
        var tally = new Tally("bits of entries");
        tally.MustPass(Verify(Entries, Batch.Head, TestKeys.Receipt).Ok, "ledger");
        for (var k = 0; k < Entries.Length; k++)
        {
            for (var place = 0; place < Entries[k].Length; place++)
            {
                foreach (var bit in new[] { place % 8, (place + 5) % 8 })
                {
                    var altered = (byte[])Entries[k].Clone();
                    altered[place] ^= (byte)(1 << bit);
                    var result = Verify(With(k, altered), null, TestKeys.Receipt);

                    // Where the entry is still well formed, the next one does not follow it; after the last, the receipt tells.
                    var named = result.FirstBad == k + 1 || result.FirstBad == k + 2 || (k == Entries.Length - 1 && result.FirstBad is null);
                    tally.MustBeFound(!result.Ok && named, $"entry {k + 1}, byte {place}, bit {bit}");
                }
            }
        }

        return tally;
    }

    /// <summary>Every entry cut short at every byte, and lengthened.</summary>
    public static Tally Lengths()
    {
        var tally = new Tally("lengths of entries");
        for (var k = 0; k < Entries.Length; k++)
        {
            for (var length = 0; length < Entries[k].Length; length++)
            {
                Found(tally, With(k, Entries[k][..length]), k + 1, $"entry {k + 1} cut to {length} bytes");
            }

            foreach (var more in new byte[] { 0, (byte)' ', (byte)'\n', (byte)'}' })
            {
                Found(tally, With(k, [.. Entries[k], more]), k + 1, $"entry {k + 1} with {more} after it");
                Found(tally, With(k, [more, .. Entries[k]]), k + 1, $"entry {k + 1} with {more} before it");
            }
        }

        return tally;
    }

    /// <summary>The same entry in another spelling, which says the same but is another file.</summary>
    public static Tally Spellings()
    {
        var tally = new Tally("spellings of entries");
        for (var k = 0; k < Entries.Length; k++)
        {
            var text = Encoding.UTF8.GetString(Entries[k]);
            string[] spellings =
            [
                text.Replace("\"at\":", "\"at\": ", StringComparison.Ordinal),
                text.Replace("\"kind\"", "\"\\u006bind\"", StringComparison.Ordinal),
                text.Replace($"\"number\":{k + 1}", $"\"number\":{k + 1}.0", StringComparison.Ordinal),
                text.Replace($"\"number\":{k + 1}", $"\"number\":{k + 1}e0", StringComparison.Ordinal),
                text.Replace($"\"number\":{k + 1}", $"\"number\":0{k + 1}", StringComparison.Ordinal),
                text.Replace($"\"number\":{k + 1}", $"\"number\":\"{k + 1}\"", StringComparison.Ordinal),
                text.Replace("00Z\"", "00+00:00\"", StringComparison.Ordinal).Replace("0Z\"", "0z\"", StringComparison.Ordinal),
                text.Insert(text.Length - 1, ",\"zz\":null"),
                text.Insert(1, "\"aa\":1,"),
                text.Replace("},\"kind\"", ",\"z\":1},\"kind\"", StringComparison.Ordinal),
                text.Replace("\"previous\":\"", "\"previous\":\"A", StringComparison.Ordinal),
                "\ufeff" + text,
                "[" + text + "]",
            ];
            foreach (var spelling in spellings)
            {
                if (spelling != text)
                {
                    Found(tally, With(k, Encoding.UTF8.GetBytes(spelling)), k + 1, $"entry {k + 1} spelled {spelling}");
                }
            }
        }

        return tally;
    }

    /// <summary>Entries left out, cut off, doubled, exchanged, put in.</summary>
    public static Tally Order()
    {
        var tally = new Tally("order of entries");
        var foreign = SmallLedger.Form("another-ledger").Entries.Select(e => e.CanonicalBytes.ToArray()).ToArray();
        for (var k = 0; k < Entries.Length; k++)
        {
            Found(tally, [.. Entries[..k], .. Entries[(k + 1)..]], k + 1, $"entry {k + 1} left out");
            Found(tally, Entries[..k], k + 1, $"tail cut from entry {k + 1}");
            Found(tally, Entries[(k + 1)..], 1, $"beginning cut up to entry {k + 1}");
            Found(tally, With(k, foreign[k]), k + 1, $"entry {k + 1} of another ledger in its place");
            Found(tally, [.. Entries[..k], .. foreign[k..]], k + 1, $"another ledger from entry {k + 1} on");
            for (var j = 0; j <= Entries.Length; j++)
            {
                Found(tally, [.. Entries[..j], Entries[k], .. Entries[j..]], j == k ? k + 2 : j + 1, $"entry {k + 1} doubled before {j + 1}", head: true);
                Found(tally, [.. Entries[..j], foreign[k], .. Entries[j..]], j + 1, $"entry {k + 1} of another ledger put before {j + 1}", head: true);
            }

            for (var j = k + 1; j < Entries.Length; j++)
            {
                var swapped = (byte[][])Entries.Clone();
                (swapped[k], swapped[j]) = (swapped[j], swapped[k]);
                Found(tally, swapped, k + 1, $"entries {k + 1} and {j + 1} exchanged");
                Found(tally, [.. Entries[..k], .. Entries[k..(j + 1)].Reverse(), .. Entries[(j + 1)..]], k + 1, $"entries {k + 1} to {j + 1} reversed");
            }
        }

        return tally;
    }

    /// <summary>One entry replaced and all that follow formed anew, so that the chain is whole again: only what is kept apart tells.</summary>
    public static Tally Rewriting()
    {
        var tally = new Tally("rewritten ledgers");
        for (var k = 0; k < Entries.Length; k++)
        {
            foreach (var (draft, how) in Replacements(SmallLedger.Drafts()[k]))
            {
                var drafts = SmallLedger.Drafts().ToArray();
                drafts[k] = draft;
                Rewritten(tally, drafts, $"entry {k + 1}, {how}");
            }

            var without = SmallLedger.Drafts().ToList();
            without.RemoveAt(k);
            Rewritten(tally, without, $"entry {k + 1} left out");
            if (k < Entries.Length - 1)
            {
                // The last entry recorded again would be a further entry, which a receipt does not forbid.
                var doubled = SmallLedger.Drafts().ToList();
                doubled.Insert(k, doubled[k]);
                Rewritten(tally, doubled, $"entry {k + 1} doubled");
            }

            for (var j = k + 1; j < Entries.Length; j++)
            {
                var swapped = SmallLedger.Drafts().ToArray();
                (swapped[k], swapped[j]) = (swapped[j], swapped[k]);
                Rewritten(tally, swapped, $"entries {k + 1} and {j + 1} exchanged");
            }
        }

        return tally;
    }

    /// <summary>The stored head altered in each of its values.</summary>
    public static Tally Heads()
    {
        var tally = new Tally("stored heads");
        var head = Batch.Head;
        tally.MustPass(Verify(Entries, head).Ok, "head");
        Wrong(head with { LedgerId = "another-ledger" }, "ledger");
        for (var count = -1; count < 20; count++)
        {
            if (count != head.Count)
            {
                Wrong(head with { Count = count }, $"count {count}");
                Wrong(count < 0 ? head with { Count = count, Frontier = [] } : HeadOf(count), $"head of {count} entries");
            }
        }

        for (var place = 0; place < 32; place++)
        {
            for (var bit = 0; bit < 8; bit++)
            {
                Wrong(head with { LastHash = Merkle.TestLeaves.Flip(head.LastHash, place, bit) }, $"last hash, byte {place}, bit {bit}");
                for (var node = 0; node < head.Frontier.Count; node++)
                {
                    var frontier = head.Frontier.ToArray();
                    frontier[node] = Merkle.TestLeaves.Flip(frontier[node], place, bit);
                    Wrong(head with { Frontier = frontier }, $"subtree {node}, byte {place}, bit {bit}");
                }
            }
        }

        Wrong(head with { Frontier = [.. head.Frontier.Reverse()] }, "subtrees reversed");
        Wrong(head with { Frontier = [.. head.Frontier.Skip(1)] }, "first subtree left out");
        Wrong(head with { Frontier = [.. head.Frontier.SkipLast(1)] }, "last subtree left out");
        Wrong(head with { Frontier = [.. head.Frontier, head.LastHash] }, "subtree appended");
        Wrong(head with { Frontier = [] }, "no subtrees");
        Wrong(LedgerHead.Empty(SmallLedger.Id), "empty head");
        return tally;

        void Wrong(LedgerHead altered, string how) => tally.MustBeFound(Verify(Entries, altered) is { Ok: false, Problem: not null }, how);
    }

    private static LedgerHead HeadOf(int count)
    {
        var drafts = SmallLedger.Drafts();
        return LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), [.. Enumerable.Range(0, count).Select(i => drafts[i % drafts.Count])]).Head;
    }

    private static IEnumerable<(EntryDraft Draft, string How)> Replacements(EntryDraft draft)
    {
        var body = draft.Body.DeepClone().AsObject();
        body["added"] = 1;
        yield return (draft with { Body = body }, "body");
        yield return (draft with { Body = [], Kind = "other/1" }, "emptied");
        yield return (draft with { Kind = draft.Kind.Replace("/1", "/2", StringComparison.Ordinal) }, "version");
        yield return (draft with { At = draft.At.AddTicks(10) }, "time");
        yield return (draft with { By = draft.By with { Name = draft.By.Name + "." } }, "name");
        yield return (draft with { By = draft.By with { PersonId = "person-3" } }, "person");
        yield return (draft with { Reason = (draft.Reason ?? "") + "!" }, "reason");
        yield return (draft with { Sealed = draft.Sealed is null ? SmallLedger.Sealed(1, "{}") : null }, "sealed part");
        yield return (draft with { Sealed = SmallLedger.Sealed(99, """{"categories":["männlich","weiblich","小"]}""") }, "sealed content");
    }

    private static void Rewritten(Tally tally, IReadOnlyList<EntryDraft> drafts, string how)
    {
        var rewritten = LedgerAppender.Append(LedgerHead.Empty(SmallLedger.Id), drafts);
        byte[][] entries = [.. rewritten.Entries.Select(e => e.CanonicalBytes.ToArray())];
        tally.MustPass(Verify(entries, rewritten.Head).Ok, $"chain with {how}, nothing kept apart,");
        tally.MustBeFound(!Verify(entries, Batch.Head).Ok, $"{how}, by the stored head");
        tally.MustBeFound(!Verify(entries, null, TestKeys.Receipt).Ok, $"{how}, by the receipt");
        tally.MustBeFound(!Verify(entries, rewritten.Head, TestKeys.Receipt).Ok, $"{how}, by the receipt though the head was rewritten too");
    }

    private static void Found(Tally tally, IReadOnlyList<byte[]> entries, int firstBad, string how, bool head = false)
    {
        var result = Verify(entries, head ? Batch.Head : null, TestKeys.Receipt);
        tally.MustBeFound(!result.Ok && result.FirstBad == firstBad && result.Problem is not null, $"{how} ({result.FirstBad}, expected {firstBad}: {result.Problem})");
    }

    private static byte[][] With(int k, byte[] entry)
    {
        var entries = (byte[][])Entries.Clone();
        entries[k] = entry;
        return entries;
    }
}
