using System.Text.Json.Nodes;
using ModelLab.Ledger;
using ModelLab.Ledger.Canonical;
using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Merkle;

namespace ModelLab.Projects.Tests.Hosting;

/// <summary>
/// Alters one entry and computes everything behind it anew, hashes, tree and head, as somebody with the whole disk in hand could.
/// Verification without a receipt then finds nothing; only the figures themselves contradict it.
/// </summary>
public static class Forgery
{
    /// <summary>Alters the last entry of a kind.</summary>
    public static void OfLast(MemoryStore store, string projectId, string kind, Action<JsonObject> alter)
    {
        var entries = store.Entries(projectId).Select(b => LedgerEntry.Parse(b)).ToList();
        var number = entries.Last(e => e.Kind == kind).Number;
        var tree = new MerkleFrontier();
        var last = Sha256Hash.Zero;
        foreach (var entry in entries)
        {
            var written = CanonicalJson.Parse(entry.CanonicalBytes.Span)!.AsObject();
            if (entry.Number == number)
            {
                alter(written["body"]!.AsObject());
            }

            written["previous"] = last.ToString();
            var bytes = CanonicalJson.Serialise(written);
            store.ReplaceEntry(projectId, entry.Number, bytes);
            last = MerkleHash.Leaf(bytes);
            tree.Append(last);
        }

        store.ReplaceHead(projectId, new LedgerHead(projectId, tree.Count, last, tree.SubtreeRoots));
    }
}
