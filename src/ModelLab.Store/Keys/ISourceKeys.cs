namespace ModelLab.Store.Keys;

/// <summary>The keys of the sources, kept apart from the data. Destroying a key makes all that is under it unreadable.</summary>
public interface ISourceKeys
{
    /// <summary>Makes the key of a source; it is stored when this returns.</summary>
    /// <exception cref="InvalidOperationException">The source has one already.</exception>
    SourceKey Create(string projectId, string sourceId);

    /// <summary>The key of a source; null when there is none or it was destroyed.</summary>
    SourceKey? Find(string projectId, string sourceId);

    /// <summary>Destroys the key of a source, where there is one.</summary>
    void Destroy(string projectId, string sourceId);

    /// <summary>All keys that there are, without the keys themselves.</summary>
    IReadOnlyList<StoredKey> All();
}

/// <summary>That a source has a key.</summary>
/// <param name="ProjectId">Id of the project.</param>
/// <param name="SourceId">Id of the source.</param>
/// <param name="MadeAt">When the key was made.</param>
public sealed record StoredKey(string ProjectId, string SourceId, DateTimeOffset MadeAt);
