using System.Text.Json;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Replaying;

/// <summary>One entry as read for a replay.</summary>
internal sealed record RecordedEntry(long Number, IEntryBody Body);

/// <summary>A revision with the findings that were recorded right behind it, in the same batch.</summary>
internal sealed record RecordedRevision(RevisionMade Body, IReadOnlyList<FindingRaised> Raised, IReadOnlyList<FindingGone> Gone);

/// <summary>The record of a project, read from its entries alone.</summary>
internal sealed class RecordedProject
{
    private readonly List<RecordedEntry> entries = [];
    private readonly List<string> problems = [];

    /// <summary>The read model formed from the entries.</summary>
    public MemoryReadModel Model { get; } = new();

    /// <summary>Entries that cannot be read, contradict those before them, or stand in the wrong place.</summary>
    public IReadOnlyList<string> Problems => problems;

    /// <summary>The bodies of a type with the numbers of their entries, in order.</summary>
    public IEnumerable<T> All<T>()
        where T : IEntryBody => entries.Select(e => e.Body).OfType<T>();

    /// <summary>Reads all entries of a ledger.</summary>
    public static async Task<RecordedProject> ReadAsync(IProjectStore store, string projectId, CancellationToken cancellation)
    {
        var record = new RecordedProject();
        var number = 0L;
        await foreach (var bytes in store.EntriesAsync(projectId, 1, cancellation))
        {
            record.Take(++number, bytes);
        }

        return record;
    }

    /// <summary>The revisions in order, each with its findings.</summary>
    public IReadOnlyList<RecordedRevision> Revisions()
    {
        var found = new List<RecordedRevision>();
        for (var i = 0; i < entries.Count; i++)
        {
            if (entries[i].Body is RevisionMade revision)
            {
                var behind = entries.Skip(i + 1).TakeWhile(e => IsFinding(e.Body)).Select(e => e.Body).ToList();
                found.Add(new RecordedRevision(revision, [.. behind.OfType<FindingRaised>()], [.. behind.OfType<FindingGone>()]));
            }
            else if (IsFinding(entries[i].Body) && (i == 0 || !(IsFinding(entries[i - 1].Body) || entries[i - 1].Body is RevisionMade)))
            {
                problems.Add($"Entry {entries[i].Number} speaks of a finding and follows no revision.");
            }
        }

        return found;
    }

    private static bool IsFinding(IEntryBody body) => body is FindingRaised or FindingGone;

    private void Take(long number, ReadOnlyMemory<byte> bytes)
    {
        try
        {
            var entry = LedgerEntry.Parse(bytes);
            if (EntryKinds.Read(entry) is { } body)
            {
                entries.Add(new RecordedEntry(entry.Number, body));
                ProjectProjection.Apply(entry, Model);
            }
        }
        catch (Exception e) when (e is FormatException or JsonException or InvalidOperationException)
        {
            problems.Add($"Entry {number} cannot be read: {e.Message}");
        }
    }
}
