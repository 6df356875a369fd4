using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Views;
using ModelLab.Store.Documents;
using ModelLab.Store.Ledgers;
using ModelLab.Store.Server;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Upkeep;

/// <summary>Forms the read model of a project anew from its ledger: to compare it with what is stored, or to put it in its place.</summary>
public sealed class ReadModelRebuild(StoreWriter writer, IDbContextFactory<ModelLabContext> contexts, IStoreProvider provider)
{
    /// <summary>Version of the documents' form. Raise it when a projection forms documents differently: the next start forms all anew.</summary>
    public const int Version = 1;

    /// <summary>Ids of all project ledgers.</summary>
    public async Task<IReadOnlyList<string>> LedgersAsync(CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        return await context.Heads.Where(h => h.LedgerId != ServerLedger.Id).Select(h => h.LedgerId).OrderBy(id => id).ToListAsync(cancellation);
    }

    /// <summary>What differs between the stored documents of a project and those that its ledger gives, one sentence each; empty for none.</summary>
    public async Task<IReadOnlyList<string>> CompareAsync(string projectId, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        await using var transaction = await provider.BeginReadAsync(context, cancellation);
        Dictionary<(string Collection, string Id), DocumentRow> formed;
        try
        {
            formed = Form(context, projectId);
        }
        catch (Exception e) when (e is FormatException or JsonException or InvalidOperationException)
        {
            return [$"Project {projectId}: its ledger gives no read model: {e.Message}"];
        }

        var differences = new List<string>();
        await foreach (var stored in context.Documents.AsNoTracking().Where(d => d.LedgerId == projectId).AsAsyncEnumerable().WithCancellation(cancellation))
        {
            var name = $"Project {projectId}, {stored.Collection} {stored.Id}";
            if (!formed.Remove((stored.Collection, stored.Id), out var document))
            {
                differences.Add($"{name}: stored, but no entry of the ledger made it.");
            }
            else if (document.Json != stored.Json)
            {
                differences.Add($"{name}: the stored document differs from what the ledger gives.");
            }
            else if (document.Position != stored.Position)
            {
                differences.Add($"{name}: stored at place {stored.Position}; the ledger gives {document.Position}.");
            }
        }

        differences.AddRange(formed.Values.Select(d => $"Project {projectId}, {d.Collection} {d.Id}: the ledger gives it, but it is not stored."));
        return differences;
    }

    /// <summary>Puts the documents that the ledger gives in the place of those stored. The ledger stays as it is.</summary>
    /// <returns>Number of documents.</returns>
    public Task<int> ReplaceAsync(string projectId, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var formed = Form(context, projectId);
            await context.Documents.Where(d => d.LedgerId == projectId).ExecuteDeleteAsync();
            context.Documents.AddRange(formed.Values);
            var head = await LedgerTransaction.HeadAsync(context, projectId);
            head.Generation++;
            return formed.Count;
        },
        cancellation);

    /// <summary>Forms all read models anew if they were stored in another form than this program's.</summary>
    public async Task ReplaceOutdatedAsync(CancellationToken cancellation)
    {
        var version = Version.ToString(System.Globalization.CultureInfo.InvariantCulture);
        await using (var context = await contexts.CreateDbContextAsync(cancellation))
        {
            if (await context.Facts.AnyAsync(f => f.Name == StoreFactRow.ReadModelVersion && f.Value == version, cancellation))
            {
                return;
            }
        }

        foreach (var projectId in await LedgersAsync(cancellation))
        {
            await ReplaceAsync(projectId, cancellation);
        }

        await writer.WriteAsync(
            async context =>
            {
                var fact = await context.Facts.SingleOrDefaultAsync(f => f.Name == StoreFactRow.ReadModelVersion);
                if (fact is null)
                {
                    context.Facts.Add(new StoreFactRow { Name = StoreFactRow.ReadModelVersion, Value = version });
                }
                else
                {
                    fact.Value = version;
                }

                return version;
            },
            cancellation);
    }

    private static Dictionary<(string Collection, string Id), DocumentRow> Form(ModelLabContext context, string projectId)
    {
        var model = new MemoryReadModel();
        var entries = context.Entries.AsNoTracking().Where(e => e.LedgerId == projectId).OrderBy(e => e.Number).Select(e => e.CanonicalBytes);
        foreach (var bytes in entries)
        {
            ProjectProjection.Apply(LedgerEntry.Parse(bytes), model);
        }

        return model.Collections
            .SelectMany(c => c.Value.Select((view, position) => new DocumentRow
            {
                LedgerId = projectId,
                Collection = ReadModelCollections.Names[c.Key],
                Id = view.Id,
                Position = position,
                Json = JsonSerializer.Serialize(view, c.Key, ProjectJson.Options),
            }))
            .ToDictionary(d => (d.Collection, d.Id));
    }
}
