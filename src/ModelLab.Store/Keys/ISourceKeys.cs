namespace ModelLab.Store.Keys;

/// <summary>The keys of the sources, kept apart from the data. Destroying a key makes all that is under it unreadable.</summary>
public interface ISourceKeys
{
    /// <summary>Makes the key of a source; it is on the disk when this returns.</summary>
    /// <exception cref="InvalidOperationException">The source has one already, or its key was destroyed.</exception>
    SourceKey Create(string projectId, string sourceId);

    /// <summary>The key of a source; null when there is none or it was destroyed.</summary>
    SourceKey? Find(string projectId, string sourceId);

    /// <summary>Destroys the key of a source that a project took up: it is withdrawn. That it was destroyed stays on record.</summary>
    void Destroy(string projectId, string sourceId);

    /// <summary>Removes the key of a source that no project took up.</summary>
    void Forget(string projectId, string sourceId);

    /// <summary>All sources that have or had a key.</summary>
    IReadOnlyList<StoredKey> All();
}

/// <summary>That a source has or had a key.</summary>
/// <param name="ProjectId">Id of the project.</param>
/// <param name="SourceId">Id of the source.</param>
/// <param name="MadeAt">When the key was made.</param>
/// <param name="DestroyedAt">When it was destroyed, or null.</param>
public sealed record StoredKey(string ProjectId, string SourceId, DateTimeOffset MadeAt, DateTimeOffset? DestroyedAt);
