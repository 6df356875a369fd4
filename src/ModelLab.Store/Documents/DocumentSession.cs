using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Store.Ledgers;

namespace ModelLab.Store.Documents;

/// <summary>A project's read model inside one transaction: reads through memory, gathers what is put.</summary>
internal sealed class DocumentSession(ModelLabContext context, string ledgerId, CachedModel model) : IReadModelWriter
{
    private readonly Dictionary<Type, ChangedCollection> changed = [];

    /// <inheritdoc/>
    public T? Find<T>(string id)
        where T : class, IView
    {
        if (changed.TryGetValue(typeof(T), out var change))
        {
            return (T?)change.Find(id);
        }

        var collection = Collection(typeof(T));
        var place = collection.PlaceOf(id);
        return place < 0 ? null : (T)collection.Views[place];
    }

    /// <inheritdoc/>
    public IReadOnlyList<T> All<T>()
        where T : class, IView =>
        [.. (changed.TryGetValue(typeof(T), out var change) ? change.Views : Collection(typeof(T)).Views).Cast<T>()];

    /// <inheritdoc/>
    public void Put<T>(T view)
        where T : class, IView
    {
        if (!changed.TryGetValue(typeof(T), out var change))
        {
            changed[typeof(T)] = change = new ChangedCollection(Collection(typeof(T)));
        }

        change.Put(view);
    }

    /// <summary>Adds what was put to the context, to be saved with it.</summary>
    public void WriteChanges()
    {
        foreach (var (type, change) in changed)
        {
            var collection = ReadModelCollections.Names[type];
            foreach (var place in change.Touched)
            {
                var row = new DocumentRow
                {
                    LedgerId = ledgerId,
                    Collection = collection,
                    Id = change.Views[place].Id,
                    Position = place,
                    Json = JsonSerializer.Serialize(change.Views[place], type, ProjectJson.Options),
                };
                if (place < change.Before)
                {
                    context.Documents.Update(row);
                }
                else
                {
                    context.Documents.Add(row);
                }
            }
        }
    }

    /// <summary>The model after what was put, at the head after it.</summary>
    public CachedModel After(LedgerHeadRow head)
    {
        var after = new CachedModel(head);
        foreach (var (type, collection) in model.Collections)
        {
            after.Collections[type] = collection;
        }

        foreach (var (type, change) in changed)
        {
            after.Collections[type] = new ViewCollection(change.Views);
        }

        return after;
    }

    private ViewCollection Collection(Type type) => model.Collections.GetOrAdd(type, Read);

    private ViewCollection Read(Type type)
    {
        var name = ReadModelCollections.Names[type];
        var documents = context.Documents.AsNoTracking()
            .Where(d => d.LedgerId == ledgerId && d.Collection == name)
            .OrderBy(d => d.Position)
            .Select(d => d.Json)
            .ToList();
        return new ViewCollection(documents.Select(json => (IView)JsonSerializer.Deserialize(json, type, ProjectJson.Options)!));
    }

    /// <summary>A collection with what was put in this transaction.</summary>
    private sealed class ChangedCollection(ViewCollection before)
    {
        private readonly Dictionary<string, int> added = new(StringComparer.Ordinal);

        public int Before => before.Views.Count;

        public List<IView> Views { get; } = [.. before.Views];

        public SortedSet<int> Touched { get; } = [];

        public IView? Find(string id)
        {
            var place = PlaceOf(id);
            return place < 0 ? null : Views[place];
        }

        public void Put(IView view)
        {
            var place = PlaceOf(view.Id);
            if (place < 0)
            {
                place = Views.Count;
                added.Add(view.Id, place);
                Views.Add(view);
            }
            else
            {
                Views[place] = view;
            }

            Touched.Add(place);
        }

        private int PlaceOf(string id) => added.TryGetValue(id, out var place) ? place : before.PlaceOf(id);
    }
}
