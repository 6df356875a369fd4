using Microsoft.EntityFrameworkCore;
using ModelLab.Store.Keys;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Vault;

/// <summary>Removes what uploads left behind: sources that no entry took up, and keys without a source.</summary>
public sealed class OrphanSweep(StoreWriter writer, IDbContextFactory<ModelLabContext> contexts, ISourceKeys keys, StoreSettings settings, TimeProvider time)
{
    /// <summary>Sweeps.</summary>
    /// <param name="atStart">Nothing is being received yet, so sources that have not come to their end go at any age.</param>
    /// <param name="cancellation">Stops between two sources.</param>
    /// <returns>Number of sources removed.</returns>
    public async Task<int> SweepAsync(bool atStart, CancellationToken cancellation)
    {
        var limit = time.GetUtcNow() - TimeSpan.FromHours(settings.OrphanHours);
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        var orphans = await context.Sources.AsNoTracking()
            .Where(s => !s.Adopted && (s.ReceivedAt < limit || (atStart && s.Chunks == 0)))
            .Select(s => new { s.ProjectId, s.SourceId })
            .ToListAsync(cancellation);
        var removed = 0;
        foreach (var orphan in orphans)
        {
            cancellation.ThrowIfCancellationRequested();
            removed += await RemoveAsync(orphan.ProjectId, orphan.SourceId, cancellation);
        }

        foreach (var key in keys.All().Where(k => k.DestroyedAt is null && (atStart || k.MadeAt < limit)))
        {
            if (!await context.Sources.AnyAsync(s => s.ProjectId == key.ProjectId && s.SourceId == key.SourceId, cancellation))
            {
                keys.Forget(key.ProjectId, key.SourceId);
            }
        }

        return removed;
    }

    private Task<int> RemoveAsync(string projectId, string sourceId, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            // Asked again inside: an entry may have taken it up in the meantime.
            if (await context.Sources.AnyAsync(s => s.ProjectId == projectId && s.SourceId == sourceId && s.Adopted))
            {
                return 0;
            }

            await context.SourceChunks.Where(c => c.ProjectId == projectId && c.SourceId == sourceId).ExecuteDeleteAsync();
            return await context.Sources.Where(s => s.ProjectId == projectId && s.SourceId == sourceId).ExecuteDeleteAsync();
        },
        cancellation);
}
