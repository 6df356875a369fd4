using ModelLab.Projects.Storage;

namespace ModelLab.Projects.Views;

/// <summary>A read model held in memory: for replay, for rebuilding, for tests.</summary>
public sealed class MemoryReadModel : IReadModelWriter, IReadModelSource
{
    private readonly Dictionary<Type, Dictionary<string, int>> places = [];
    private readonly Dictionary<Type, List<IView>> documents = [];

    /// <summary>All documents by collection, in the order in which they were first put.</summary>
    public IEnumerable<KeyValuePair<Type, IReadOnlyList<IView>>> Collections =>
        documents.Select(d => KeyValuePair.Create(d.Key, (IReadOnlyList<IView>)d.Value));

    /// <inheritdoc/>
    public T? Find<T>(string id)
        where T : class, IView =>
        places.TryGetValue(typeof(T), out var byId) && byId.TryGetValue(id, out var place) ? (T)documents[typeof(T)][place] : null;

    /// <inheritdoc/>
    public IReadOnlyList<T> All<T>()
        where T : class, IView =>
        documents.TryGetValue(typeof(T), out var all) ? [.. all.Cast<T>()] : [];

    /// <inheritdoc/>
    public void Put<T>(T view)
        where T : class, IView
    {
        if (!documents.TryGetValue(typeof(T), out var all))
        {
            documents[typeof(T)] = all = [];
            places[typeof(T)] = new Dictionary<string, int>(StringComparer.Ordinal);
        }

        if (places[typeof(T)].TryGetValue(view.Id, out var place))
        {
            all[place] = view;
        }
        else
        {
            places[typeof(T)].Add(view.Id, all.Count);
            all.Add(view);
        }
    }

    /// <inheritdoc/>
    public Task<T> ReadAsync<T>(string projectId, Func<IReadModel, T> read, CancellationToken cancellation) => Task.FromResult(read(this));
}
