using ModelLab.Intake.Csv;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Preparations;

/// <summary>The variables that a preparation makes by putting categories together.</summary>
public sealed class DerivedColumns
{
    private readonly Dictionary<string, Collapsed> byName;

    private DerivedColumns(Dictionary<string, Collapsed> byName) => this.byName = byName;

    /// <summary>No preparation, nothing derived.</summary>
    public static DerivedColumns None { get; } = new([]);

    /// <summary>Opens the sealed names of the new categories.</summary>
    /// <param name="vault">Where they are sealed.</param>
    /// <param name="projectId">The project.</param>
    /// <param name="preparation">The preparation.</param>
    /// <param name="labels">The names, where the preparation is not recorded yet; null: from the vault.</param>
    /// <param name="dictionary">The dictionary by which the preparation was made.</param>
    /// <param name="cancellation">Stops the work.</param>
    public static async Task<DerivedColumns> OpenAsync(
        ISourceVault vault, string projectId, PreparationView preparation, CategoryLabels? labels, DataDictionary dictionary, CancellationToken cancellation)
    {
        var steps = preparation.Steps.Where(s => s.Kind == StepKind.Collapse).ToList();
        if (steps.Count == 0)
        {
            return None;
        }

        labels ??= await CategoryLabels.OpenAsync(vault, projectId, preparation, cancellation);
        var contents = await SourceContents.OpenAsync(vault, projectId, dictionary.Dataset, cancellation);
        var made = new Dictionary<string, Collapsed>(StringComparer.Ordinal);
        foreach (var step in steps)
        {
            var variable = dictionary.Require(step.Variable!);
            made[step.NewVariable!] = new Collapsed(step, labels.Of(step.Id), new ColumnRequest(variable.Name, false, variable.MissingCodes, contents.Categories(variable.Name)));
        }

        return new DerivedColumns(made);
    }

    /// <summary>Whether a variable of that name is made.</summary>
    public bool Makes(string name) => byName.ContainsKey(name);

    /// <summary>The categories of a variable that is made.</summary>
    public IReadOnlyList<string> Categories(string name) => byName[name].Labels;

    /// <summary>Index of its reference category.</summary>
    public int Reference(string name) => byName[name].Step.Reference ?? 0;

    /// <summary>Reads those of the named variables that are made here.</summary>
    public async Task<IReadOnlyList<Column>> ReadAsync(
        DatasetColumns columns, string projectId, SourceView source, IEnumerable<string> names, CancellationToken cancellation)
    {
        var wanted = names.Where(byName.ContainsKey).Select(n => byName[n]).ToList();
        var read = await columns.ReadAsync(projectId, source, [.. wanted.Select(w => w.Request)], cancellation);
        return [.. wanted.Zip(read, (w, column) => Collapse(w, (CategoryColumn)column))];
    }

    private static CategoryColumn Collapse(Collapsed made, CategoryColumn column)
    {
        var groupOf = new int[column.Categories.Count];
        Array.Fill(groupOf, -1);
        for (var g = 0; g < made.Step.Groups!.Count; g++)
        {
            foreach (var category in made.Step.Groups[g])
            {
                groupOf[category] = g;
            }
        }

        var codes = new int[column.Rows];
        for (var row = 0; row < codes.Length; row++)
        {
            codes[row] = column.Codes[row] < 0 ? -1 : groupOf[column.Codes[row]];
        }

        return new CategoryColumn(made.Step.NewVariable!, codes, made.Labels, made.Step.Reference ?? 0);
    }

    private sealed record Collapsed(PreparationStep Step, IReadOnlyList<string> Labels, ColumnRequest Request);
}
