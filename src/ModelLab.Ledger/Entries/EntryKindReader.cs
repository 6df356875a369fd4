using System.Text.Json.Nodes;

namespace ModelLab.Ledger.Entries;

/// <summary>Raises a body from one version of its kind to the next. Gets a copy that it may alter and return.</summary>
/// <param name="body">The body as the lower version has it.</param>
/// <returns>The body as the next version has it.</returns>
public delegate JsonObject RaiseBody(JsonObject body);

/// <summary>
/// Reads one kind of entry in all its versions: older bodies are raised step by step to the newest version, on reading
/// only; what is stored stays.
/// </summary>
public sealed class EntryKindReader
{
    private readonly RaiseBody[] raises;
    private readonly Func<JsonObject, object> read;

    private EntryKindReader(string name, Func<JsonObject, object> read, RaiseBody[] raises)
    {
        if (!EntryKind.IsName(name))
        {
            throw new ArgumentException($"'{name}' is no name of a kind of entry: lower-case words joined by hyphens are expected.", nameof(name));
        }

        Name = name;
        this.read = read;
        this.raises = raises;
    }

    /// <summary>Name of the kind, without a version.</summary>
    public string Name { get; }

    /// <summary>The newest version known.</summary>
    public int NewestVersion => raises.Length + 1;

    /// <summary>All versions it reads, from the first to the newest.</summary>
    public IEnumerable<EntryKind> Kinds => Enumerable.Range(1, NewestVersion).Select(v => new EntryKind(Name, v));

    /// <summary>Describes a kind.</summary>
    /// <param name="name">Its name without a version.</param>
    /// <param name="read">Reads a body of the newest version.</param>
    /// <param name="raises">From version 1 to 2, from 2 to 3 and so on; none while there is one version.</param>
    /// <typeparam name="T">What a body is read as.</typeparam>
    /// <exception cref="ArgumentException">Not a name.</exception>
    public static EntryKindReader For<T>(string name, Func<JsonObject, T> read, params RaiseBody[] raises)
        where T : class => new(name, read, [.. raises]);

    /// <summary>Reads a body of a version.</summary>
    internal object Read(JsonObject body, int version)
    {
        var raised = body.DeepClone().AsObject();
        for (var v = version; v < NewestVersion; v++)
        {
            raised = raises[v - 1](raised);
        }

        return read(raised);
    }
}
