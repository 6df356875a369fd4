using System.Collections.Concurrent;
using ModelLab.Ledger;
using ModelLab.Store.Ledgers;

namespace ModelLab.Store.Documents;

/// <summary>The documents of one project at one state of its ledger, as far as they were read.</summary>
internal sealed class CachedModel(LedgerHeadRow head)
{
    private readonly long count = head.Count;
    private readonly Sha256Hash lastHash = head.LastHash;
    private readonly int generation = head.Generation;

    /// <summary>Entries of the ledger at this state.</summary>
    public long Count => count;

    /// <summary>Collections read so far.</summary>
    public ConcurrentDictionary<Type, ViewCollection> Collections { get; } = [];

    /// <summary>When it was last asked for.</summary>
    public long Used { get; set; }

    /// <summary>Whether it shows the state of a head.</summary>
    public bool Shows(LedgerHeadRow other) => count == other.Count && lastHash == other.LastHash && generation == other.Generation;
}

/// <summary>
/// Documents held in memory so that a page does not read and parse a whole project again. Each use compares with the head
/// in its own transaction, so that a copy is never older than the ledger, whoever wrote it.
/// </summary>
internal sealed class ReadModelCache
{
    private const int MostLedgers = 64;

    private readonly ConcurrentDictionary<string, CachedModel> models = new(StringComparer.Ordinal);
    private long clock;

    /// <summary>The model that shows the state of a head, new where there is none.</summary>
    public CachedModel Get(LedgerHeadRow head)
    {
        if (models.TryGetValue(head.LedgerId, out var model) && model.Shows(head))
        {
            model.Used = Interlocked.Increment(ref clock);
            return model;
        }

        var fresh = new CachedModel(head);
        Put(head.LedgerId, fresh);
        return fresh;
    }

    /// <summary>Takes a model in, unless there is one of a later state.</summary>
    public void Put(string ledgerId, CachedModel model)
    {
        model.Used = Interlocked.Increment(ref clock);
        models.AddOrUpdate(ledgerId, model, (_, old) => old.Count > model.Count ? old : model);
        if (models.Count > MostLedgers)
        {
            var oldest = models.MinBy(m => m.Value.Used).Key;
            models.TryRemove(oldest, out _);
        }
    }
}
