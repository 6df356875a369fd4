using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Datasets;

/// <summary>The data dictionary of a dataset as it stood at an entry.</summary>
public sealed class DataDictionary
{
    private readonly Dictionary<string, VariableView> byName;

    private DataDictionary(DatasetView dataset, long entry, IReadOnlyList<VariableView> variables)
    {
        Dataset = dataset;
        Entry = entry;
        Variables = variables;
        byName = variables.ToDictionary(v => v.Name, StringComparer.Ordinal);
    }

    /// <summary>The dataset.</summary>
    public DatasetView Dataset { get; }

    /// <summary>The last entry that had changed it.</summary>
    public long Entry { get; }

    /// <summary>The variables in the order of the file's columns.</summary>
    public IReadOnlyList<VariableView> Variables { get; }

    /// <summary>The dictionary as it stood at an entry, or as it stands now.</summary>
    public static DataDictionary At(IReadModel model, DatasetView dataset, long? entry = null)
    {
        var latest = new Dictionary<string, VariableView>(StringComparer.Ordinal);
        foreach (var state in model.All<VariableView>())
        {
            if (state.DatasetId == dataset.Id && (entry is null || state.EntryNumber <= entry)
                && (!latest.TryGetValue(state.VariableId, out var known) || known.EntryNumber < state.EntryNumber))
            {
                latest[state.VariableId] = state;
            }
        }

        var variables = dataset.VariableIds.Select(id => latest[id]).ToList();
        return new DataDictionary(dataset, variables.Max(v => v.EntryNumber), variables);
    }

    /// <summary>The variable of a name, or null.</summary>
    public VariableView? Find(string name) => byName.GetValueOrDefault(name);

    /// <summary>The variable of an id or a name.</summary>
    /// <exception cref="RefusedException">There is none.</exception>
    public VariableView Require(string idOrName) =>
        Variables.FirstOrDefault(v => v.VariableId == idOrName) ?? Find(idOrName)
        ?? throw new RefusedException(RefusalKind.NotFound, $"The dataset has no variable '{idOrName}'. Its variables are: {string.Join(", ", Variables.Take(40).Select(v => v.Name))}.");
}
