using System.Security.Cryptography;
using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Verification;
using ModelLab.Projects;
using ModelLab.Store.Keys;
using ModelLab.Store.Vault;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Upkeep;

/// <summary>What a check of everything stored found.</summary>
/// <param name="Problems">One sentence each; empty when all is well.</param>
/// <param name="Ledgers">Ledgers verified.</param>
/// <param name="Entries">Their entries.</param>
/// <param name="Sources">Sources that opened to their hash.</param>
/// <param name="Withdrawn">Sources whose key was destroyed on purpose.</param>
/// <param name="SealedParts">Sealed parts that matched their entry.</param>
/// <param name="Contents">Kept contents that opened to their hash.</param>
public sealed record CheckResult(IReadOnlyList<string> Problems, int Ledgers, long Entries, int Sources, int Withdrawn, int SealedParts, int Contents)
{
    /// <summary>Nothing wrong.</summary>
    public bool Ok => Problems.Count == 0;
}

/// <summary>Checks what is stored against itself: ledgers, read models, sources, sealed parts, kept contents.</summary>
public sealed class ContentCheck(
    IDbContextFactory<ModelLabContext> contexts, IStoreProvider provider, SqlSourceVault vault, ISourceKeys keys, ReadModelRebuild readModels)
{
    /// <summary>Checks everything; reads only.</summary>
    public async Task<CheckResult> RunAsync(CancellationToken cancellation)
    {
        var problems = new List<string>();
        var (ledgers, entries) = await LedgersAsync(problems, cancellation);
        foreach (var projectId in await readModels.LedgersAsync(cancellation))
        {
            problems.AddRange(await readModels.CompareAsync(projectId, cancellation));
        }

        var destroyed = keys.All().Where(k => k.DestroyedAt is not null).Select(k => (k.ProjectId, k.SourceId)).ToHashSet();
        var (sources, withdrawn) = await SourcesAsync(destroyed, problems, cancellation);
        var parts = await SealedPartsAsync(destroyed, problems, cancellation);
        var contents = await ContentsAsync(destroyed, problems, cancellation);
        return new CheckResult(problems, ledgers, entries, sources, withdrawn, parts, contents);
    }

    private async Task<(int Ledgers, long Entries)> LedgersAsync(List<string> problems, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        await using var transaction = await provider.BeginReadAsync(context, cancellation);
        var heads = await context.Heads.AsNoTracking().OrderBy(h => h.LedgerId).ToListAsync(cancellation);
        var headless = await context.Entries.Select(e => e.LedgerId).Distinct().Where(id => !context.Heads.Any(h => h.LedgerId == id)).ToListAsync(cancellation);
        problems.AddRange(headless.Select(id => $"Ledger {id} has entries but no head."));
        var entries = 0L;
        foreach (var head in heads)
        {
            var verifier = new LedgerVerifier(head.LedgerId);
            var stored = context.Entries.AsNoTracking().Where(e => e.LedgerId == head.LedgerId).OrderBy(e => e.Number).Select(e => new { e.Number, e.CanonicalBytes, e.Hash });
            await foreach (var entry in stored.AsAsyncEnumerable().WithCancellation(cancellation))
            {
                verifier.Add(entry.CanonicalBytes);
                if (HashOf(entry.CanonicalBytes) is { } hash && hash != entry.Hash)
                {
                    problems.Add($"Ledger {head.LedgerId}, entry {entry.Number}: the hash beside the entry is not the entry's.");
                }
            }

            var result = verifier.Finish(head.ToHead());
            entries += result.Entries;
            if (!result.Ok)
            {
                problems.Add($"Ledger {head.LedgerId}{(result.FirstBad is { } bad ? $", entry {bad}" : string.Empty)}: {result.Problem}");
            }
        }

        return (heads.Count, entries);
    }

    // Bytes that are no entry are the verifier's finding.
    private static Sha256Hash? HashOf(byte[] canonicalBytes)
    {
        try
        {
            return LedgerEntry.Parse(canonicalBytes).Hash;
        }
        catch (FormatException)
        {
            return null;
        }
    }

    private async Task<(int Sources, int Withdrawn)> SourcesAsync(HashSet<(string, string)> destroyed, List<string> problems, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var sources = await context.Sources.AsNoTracking().Where(s => s.Adopted).OrderBy(s => s.ProjectId).ThenBy(s => s.SourceId).ToListAsync(cancellation);
        var good = 0;
        var withdrawn = 0;
        foreach (var source in sources)
        {
            if (destroyed.Contains((source.ProjectId, source.SourceId)))
            {
                withdrawn++;
            }
            else if (await ProblemOfAsync(source, cancellation) is { } problem)
            {
                problems.Add($"Project {source.ProjectId}, source {source.SourceId}: {problem}");
            }
            else
            {
                good++;
            }
        }

        return (good, withdrawn);
    }

    private async Task<string?> ProblemOfAsync(SourceRow source, CancellationToken cancellation)
    {
        try
        {
            await using var stream = vault.Open(source.ProjectId, source.SourceId);
            var hash = new Sha256Hash(await SHA256.HashDataAsync(stream, cancellation));
            return hash == source.Sha256 ? null : "its bytes do not give the SHA-256 that was stored.";
        }
        catch (RefusedException e) when (e.Kind == RefusalKind.Withdrawn)
        {
            return "its key is missing, and nobody destroyed it. Restore the backup of the keys.";
        }
        catch (Exception e) when (e is VaultDamagedException or KeysUnusableException)
        {
            return e.Message;
        }
    }

    private async Task<int> SealedPartsAsync(HashSet<(string, string)> destroyed, List<string> problems, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var good = 0;
        var places = await context.Entries.AsNoTracking()
            .Where(e => e.LedgerId != Server.ServerLedger.Id)
            .OrderBy(e => e.LedgerId).ThenBy(e => e.Number)
            .Select(e => new { e.LedgerId, e.Number, Source = context.SealedParts.Where(p => p.LedgerId == e.LedgerId && p.EntryNumber == e.Number).Select(p => p.SourceId).FirstOrDefault() })
            .ToListAsync(cancellation);
        foreach (var place in places.Where(p => p.Source is null || !destroyed.Contains((p.LedgerId, p.Source))))
        {
            try
            {
                good += await vault.UnsealAsync(place.LedgerId, place.Number, cancellation) is null ? 0 : 1;
            }
            catch (Exception e) when (e is RefusedException or KeysUnusableException or FormatException)
            {
                problems.Add($"Project {place.LedgerId}, sealed part of entry {place.Number}: {e.Message}");
            }
        }

        return good;
    }

    private async Task<int> ContentsAsync(HashSet<(string, string)> destroyed, List<string> problems, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var good = 0;
        await foreach (var row in context.KeptContents.AsNoTracking().AsAsyncEnumerable().WithCancellation(cancellation))
        {
            if (destroyed.Contains((row.ProjectId, row.SourceId)))
            {
                continue;
            }

            try
            {
                KeptContentCipher.Decrypt(keys.Find(row.ProjectId, row.SourceId) ?? throw SqlSourceVault.Withdrawn(), row);
                good++;
            }
            catch (Exception e) when (e is RefusedException or VaultDamagedException or KeysUnusableException)
            {
                problems.Add($"Project {row.ProjectId}, kept content {row.Hash}: {e.Message}");
            }
        }

        return good;
    }
}
