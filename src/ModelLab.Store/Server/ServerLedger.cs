using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;
using ModelLab.Store.Ledgers;

namespace ModelLab.Store.Server;

/// <summary>The ledger of what concerns the server and no project: people, tokens, first set-up.</summary>
internal static class ServerLedger
{
    /// <summary>Its id.</summary>
    public const string Id = "server";

    /// <summary>Adds an entry within the transaction that makes the change it tells of.</summary>
    public static async Task RecordAsync(ModelLabContext context, string kind, DateTimeOffset at, Author by, string? reason, JsonObject body)
    {
        var head = context.Heads.Local.SingleOrDefault(h => h.LedgerId == Id) ?? await LedgerTransaction.HeadAsync(context, Id);
        LedgerTransaction.Append(
            context, head, [new EntryDraft(kind, at, by, reason, body)],
            _ => throw new InvalidOperationException("Entries of the server ledger have no sealed parts."));
    }
}
