using ModelLab.Projects.Views;

namespace ModelLab.Store.Documents;

/// <summary>All documents of one type of one project at one state; never changed once made.</summary>
internal sealed class ViewCollection
{
    private readonly IView[] views;
    private readonly Dictionary<string, int> places;

    public ViewCollection(IEnumerable<IView> inOrder)
    {
        views = [.. inOrder];
        places = new Dictionary<string, int>(views.Length, StringComparer.Ordinal);
        for (var i = 0; i < views.Length; i++)
        {
            places.Add(views[i].Id, i);
        }
    }

    /// <summary>The documents, in the order in which they were first put.</summary>
    public IReadOnlyList<IView> Views => views;

    /// <summary>Place of a document, or −1.</summary>
    public int PlaceOf(string id) => places.GetValueOrDefault(id, -1);
}
