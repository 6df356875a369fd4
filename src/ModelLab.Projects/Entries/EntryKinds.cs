using System.Text.Json;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;

namespace ModelLab.Projects.Entries;

/// <summary>
/// The kinds of entries of a project ledger. Names and versions are stored and never change: a new shape gets a new
/// version, and the old one stays readable here.
/// </summary>
public static class EntryKinds
{
    private static readonly Dictionary<string, Type> TypeByKind = new(StringComparer.Ordinal)
    {
        ["project-opened/1"] = typeof(ProjectOpened),
        ["member-joined/1"] = typeof(MemberJoined),
        ["member-role-changed/1"] = typeof(MemberRoleChanged),
        ["member-left/1"] = typeof(MemberLeft),
        ["source-received/1"] = typeof(SourceReceived),
        ["dataset-read/1"] = typeof(DatasetRead),
        ["variable-described/1"] = typeof(VariableDescribed),
        ["preparation-made/1"] = typeof(PreparationMade),
        ["path-started/1"] = typeof(PathStarted),
        ["revision/1"] = typeof(RevisionMade),
        ["rule-run/1"] = typeof(RuleRun),
        ["comment-made/1"] = typeof(CommentMade),
        ["comment-settled/1"] = typeof(CommentSettled),
        ["finding-raised/1"] = typeof(FindingRaised),
        ["finding-accepted/1"] = typeof(FindingAccepted),
        ["finding-gone/1"] = typeof(FindingGone),
    };

    private static readonly Dictionary<Type, string> KindByType = TypeByKind.ToDictionary(p => p.Value, p => p.Key);

    /// <summary>All kinds that this program writes and reads.</summary>
    public static IReadOnlyCollection<string> All => TypeByKind.Keys;

    /// <summary>The kind under which a body is written.</summary>
    public static string KindOf(IEntryBody body) => KindByType[body.GetType()];

    /// <summary>Forms the draft of an entry.</summary>
    public static EntryDraft Draft(IEntryBody body, DateTimeOffset at, Author by, string? reason, SealedContent? sealedContent = null) =>
        new(KindOf(body), at, by, reason, JsonSerializer.SerializeToNode(body, body.GetType(), ProjectJson.Options)!.AsObject(), sealedContent);

    /// <summary>Reads the body of an entry; null for a kind that this program does not know.</summary>
    public static IEntryBody? Read(LedgerEntry entry) =>
        TypeByKind.TryGetValue(entry.Kind, out var type) ? (IEntryBody?)entry.Body.Deserialize(type, ProjectJson.Options) : null;

    /// <summary>Reads the body of an entry of a known kind.</summary>
    /// <exception cref="InvalidOperationException">The entry is of another kind.</exception>
    public static T Read<T>(LedgerEntry entry)
        where T : class, IEntryBody =>
        Read(entry) as T ?? throw new InvalidOperationException($"Entry {entry.Number} is a {entry.Kind}, not a {typeof(T).Name}.");

    /// <summary>Reads a value out of sealed content.</summary>
    public static T? ReadSealed<T>(JsonObject? content, string member) =>
        content is not null && content.TryGetPropertyValue(member, out var node) && node is not null ? node.Deserialize<T>(ProjectJson.Options) : default;
}
