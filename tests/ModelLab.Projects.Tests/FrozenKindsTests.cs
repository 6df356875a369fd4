using System.Text.Json.Nodes;
using ModelLab.Ledger.Tests.Entries;
using ModelLab.Projects.Entries;

namespace ModelLab.Projects.Tests;

/// <summary>Entries as they were stored when their kind and version were new stay readable for ever, with nothing lost.</summary>
public sealed class FrozenKindsTests
{
    private static string Folder => Path.Combine(AppContext.BaseDirectory, "Fixtures", "Kinds");

    [Fact]
    public void Every_kind_has_a_frozen_entry_that_reads_without_loss()
    {
        Assert.Empty(FrozenEntries.Problems(Folder, EntryKinds.All, entry =>
        {
            var body = EntryKinds.Read(entry) ?? throw new InvalidOperationException("the program does not know this kind");
            var again = EntryKinds.Draft(body, entry.At, entry.By, entry.Reason).Body;
            if (!JsonNode.DeepEquals(entry.Body, again))
            {
                throw new InvalidOperationException($"reading and writing changed the body to {again.ToJsonString()}");
            }
        }));
    }

    [Fact]
    public void A_kind_without_a_frozen_entry_is_found() =>
        Assert.Contains(FrozenEntries.Problems(Folder, [.. EntryKinds.All, "revision/2"], _ => { }), p => p.StartsWith("revision/2", StringComparison.Ordinal));
}
