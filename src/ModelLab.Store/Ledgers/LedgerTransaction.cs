using System.Security.Cryptography;
using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger.Entries;
using ModelLab.Store.Keys;

namespace ModelLab.Store.Ledgers;

/// <summary>Appends to a ledger inside a running write transaction.</summary>
internal static class LedgerTransaction
{
    /// <summary>The tracked head of a ledger; a new one for a ledger with no entry.</summary>
    public static async Task<LedgerHeadRow> HeadAsync(ModelLabContext context, string ledgerId)
    {
        var row = await context.Heads.SingleOrDefaultAsync(h => h.LedgerId == ledgerId);
        if (row is null)
        {
            row = new LedgerHeadRow { LedgerId = ledgerId };
            context.Heads.Add(row);
        }

        return row;
    }

    /// <summary>Numbers, hashes and adds entries with their sealed parts, and moves the head.</summary>
    public static AppendedBatch Append(ModelLabContext context, LedgerHeadRow head, IReadOnlyList<EntryDraft> drafts, Func<string, SourceKey> keyOf)
    {
        var appended = LedgerAppender.Append(head.ToHead(), drafts);
        for (var i = 0; i < drafts.Count; i++)
        {
            var entry = appended.Entries[i];
            context.Entries.Add(new LedgerEntryRow
            {
                LedgerId = entry.LedgerId,
                Number = entry.Number,
                CanonicalBytes = entry.CanonicalBytes.ToArray(),
                Hash = entry.Hash,
            });
            if (drafts[i].Sealed is { } sealedContent)
            {
                var nonce = RandomNumberGenerator.GetBytes(SourceKey.NonceLength);
                context.SealedParts.Add(new SealedPartRow
                {
                    LedgerId = entry.LedgerId,
                    EntryNumber = entry.Number,
                    SourceId = sealedContent.SourceId,
                    Nonce = nonce,
                    Ciphertext = SealedPartCipher.Encrypt(keyOf(sealedContent.SourceId), entry.LedgerId, entry.Number, nonce, sealedContent),
                });
            }
        }

        head.MoveTo(appended.Head);
        return appended;
    }
}
