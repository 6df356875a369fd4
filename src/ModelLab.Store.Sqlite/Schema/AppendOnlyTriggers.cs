using Microsoft.Data.Sqlite;
using ModelLab.Store.Sqlite.Connections;

namespace ModelLab.Store.Sqlite.Schema;

/// <summary>
/// Triggers by which the database itself refuses to change or remove what is append-only. A migration that rebuilds a
/// table drops its triggers, so they are made anew and checked at every start.
/// </summary>
public static class AppendOnlyTriggers
{
    private static readonly Trigger[] Triggers =
    [
        // Insert is guarded too, because INSERT OR REPLACE removes a row without asking the triggers for deletion.
        Refuse("ledger_entries_insert", "INSERT", "ledger_entries", "EXISTS (SELECT 1 FROM ledger_entries WHERE ledger_id = NEW.ledger_id AND number = NEW.number)", "ledger entries are never replaced"),
        Refuse("ledger_entries_update", "UPDATE", "ledger_entries", null, "ledger entries are never changed"),
        Refuse("ledger_entries_delete", "DELETE", "ledger_entries", null, "ledger entries are never removed"),
        Refuse("ledger_heads_insert", "INSERT", "ledger_heads", "EXISTS (SELECT 1 FROM ledger_heads WHERE ledger_id = NEW.ledger_id)", "a ledger has one head"),
        Refuse("ledger_heads_update", "UPDATE", "ledger_heads", "NEW.ledger_id <> OLD.ledger_id OR NEW.\"count\" < OLD.\"count\"", "a ledger does not become shorter"),
        Refuse("ledger_heads_delete", "DELETE", "ledger_heads", null, "a ledger is never removed"),
        Refuse("sealed_parts_insert", "INSERT", "sealed_parts", "EXISTS (SELECT 1 FROM sealed_parts WHERE ledger_id = NEW.ledger_id AND entry_number = NEW.entry_number)", "sealed parts are never replaced"),
        Refuse("sealed_parts_update", "UPDATE", "sealed_parts", null, "sealed parts are never changed"),
        Refuse("sealed_parts_delete", "DELETE", "sealed_parts", null, "sealed parts are never removed"),
        Refuse("kept_contents_insert", "INSERT", "kept_contents", "EXISTS (SELECT 1 FROM kept_contents WHERE project_id = NEW.project_id AND hash = NEW.hash AND source_id = NEW.source_id)", "kept contents are never replaced"),
        Refuse("kept_contents_update", "UPDATE", "kept_contents", null, "kept contents are never changed"),
        Refuse("kept_contents_delete", "DELETE", "kept_contents", null, "kept contents are never removed"),
        Refuse("sources_insert", "INSERT", "sources", Adopted("sources", "NEW"), "a source that was taken up is never replaced"),
        Refuse("sources_update", "UPDATE", "sources", "OLD.adopted <> 0", "a source that was taken up is never changed"),
        Refuse("sources_delete", "DELETE", "sources", "OLD.adopted <> 0", "a source that was taken up is never removed"),
        Refuse("source_chunks_insert", "INSERT", "source_chunks", Adopted("sources", "NEW"), "nothing is added to a source that was taken up"),
        Refuse("source_chunks_update", "UPDATE", "source_chunks", null, "chunks of a source are never changed"),
        Refuse("source_chunks_delete", "DELETE", "source_chunks", Adopted("sources", "OLD"), "chunks of a source that was taken up are never removed"),
    ];

    /// <summary>Names of all triggers.</summary>
    public static IReadOnlyList<string> Names { get; } = [.. Triggers.Select(t => t.Name)];

    /// <summary>Makes every trigger that is missing or says something else, then checks them all.</summary>
    /// <returns>Names of those that were made.</returns>
    /// <exception cref="StoreUnusableException">One could not be made.</exception>
    public static IReadOnlyList<string> Ensure(SqliteConnection connection)
    {
        var missing = Triggers.Where(t => Stored(connection, t.Name) != t.Sql).ToList();
        foreach (var trigger in missing)
        {
            connection.Run($"BEGIN IMMEDIATE; DROP TRIGGER IF EXISTS {trigger.Name}; {trigger.Sql}; COMMIT;");
        }

        if (Problems(connection) is [var first, ..])
        {
            throw new StoreUnusableException(first);
        }

        return [.. missing.Select(t => t.Name)];
    }

    /// <summary>Drops them, so that a migration may rebuild tables. Each start makes them anew.</summary>
    public static void Drop(SqliteConnection connection)
    {
        foreach (var name in Names)
        {
            connection.Run($"DROP TRIGGER IF EXISTS {name}");
        }
    }

    /// <summary>What is missing or different, one sentence each.</summary>
    public static IReadOnlyList<string> Problems(SqliteConnection connection) =>
        [.. Triggers
            .Select(t => (Trigger: t, Stored: Stored(connection, t.Name)))
            .Where(t => t.Stored != t.Trigger.Sql)
            .Select(t => $"The trigger {t.Trigger.Name}, which protects what is append-only, {(t.Stored is null ? "is missing" : "says something else")}.")];

    private static string? Stored(SqliteConnection connection, string name) =>
        (string?)connection.Value("SELECT sql FROM sqlite_master WHERE type = 'trigger' AND name = @name", new SqliteParameter("@name", name));

    private static string Adopted(string table, string row) =>
        $"EXISTS (SELECT 1 FROM {table} WHERE project_id = {row}.project_id AND source_id = {row}.source_id AND adopted <> 0)";

    private static Trigger Refuse(string name, string act, string table, string? when, string message) => new(
        $"append_only_{name}",
        $"CREATE TRIGGER append_only_{name} BEFORE {act} ON {table}{(when is null ? string.Empty : $" WHEN {when}")} BEGIN SELECT RAISE(ABORT, '{message}'); END");

    private sealed record Trigger(string Name, string Sql);
}
