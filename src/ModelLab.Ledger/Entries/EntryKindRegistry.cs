namespace ModelLab.Ledger.Entries;

/// <summary>An entry with what its body says.</summary>
/// <param name="Entry">The entry.</param>
/// <param name="Value">
/// The body read as its kind's type; null for a kind, or a version of it, that this program does not know. Such an
/// entry is kept, hashed and verified like any other, and its body can be shown as it is.
/// </param>
public sealed record EntryContent(LedgerEntry Entry, object? Value)
{
    /// <summary>Whether the program knows this kind in this version.</summary>
    public bool Known => Value is not null;
}

/// <summary>The kinds of entries that a program can read.</summary>
public sealed class EntryKindRegistry
{
    private readonly Dictionary<string, EntryKindReader> readers = new(StringComparer.Ordinal);

    /// <summary>Takes the readers of all kinds.</summary>
    /// <exception cref="ArgumentException">Two readers bear one name.</exception>
    public EntryKindRegistry(params IEnumerable<EntryKindReader> readers)
    {
        foreach (var reader in readers)
        {
            if (!this.readers.TryAdd(reader.Name, reader))
            {
                throw new ArgumentException($"The kind '{reader.Name}' is registered twice.", nameof(readers));
            }
        }
    }

    /// <summary>Every kind in every version that can be read, in the order of names and versions.</summary>
    public IReadOnlyList<EntryKind> Kinds =>
        [.. readers.Values.OrderBy(r => r.Name, StringComparer.Ordinal).SelectMany(r => r.Kinds)];

    /// <summary>Whether a kind can be read in this version.</summary>
    public bool Knows(string kind) => EntryKind.TryParse(kind, out var parsed) && Find(parsed) is not null;

    /// <summary>Reads an entry's body, raised to the newest version of its kind.</summary>
    /// <exception cref="FormatException">The kind is known, but the body is not what it should be.</exception>
    public EntryContent Read(LedgerEntry entry)
    {
        var kind = EntryKind.Parse(entry.Kind);
        if (Find(kind) is not { } reader)
        {
            return new EntryContent(entry, null);
        }

        try
        {
            return new EntryContent(entry, reader.Read(entry.Body, kind.Version));
        }
        catch (Exception e) when (e is System.Text.Json.JsonException or InvalidOperationException or FormatException or ArgumentException or KeyNotFoundException)
        {
            throw new FormatException($"Entry {entry.Number} calls itself {entry.Kind}, but its body cannot be read as that. {e.Message}", e);
        }
    }

    private EntryKindReader? Find(EntryKind kind) =>
        readers.GetValueOrDefault(kind.Name) is { } reader && kind.Version <= reader.NewestVersion ? reader : null;
}
