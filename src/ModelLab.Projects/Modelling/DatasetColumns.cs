using System.Text.Json;
using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Modelling;

/// <summary>Reads the variables of a dataset as the dictionary describes them.</summary>
public sealed class DatasetColumns(ISourceVault vault, ColumnCache cache)
{
    /// <summary>Most categories with which a variable may enter a model.</summary>
    public const int MostCategories = 100;

    /// <summary>Reads columns by name, each once, in the order asked.</summary>
    /// <exception cref="RefusedException">A variable cannot be read as its kind.</exception>
    public async Task<IReadOnlyList<Column>> ReadAsync(
        string projectId, SourceView source, DataDictionary dictionary, IReadOnlyList<string> names, CancellationToken cancellation)
    {
        var contents = await SourceContents.OpenAsync(vault, projectId, dictionary.Dataset, cancellation);
        var requests = names.Select(n => Request(dictionary.Require(n), contents)).ToList();
        return await ReadAsync(projectId, source, requests, cancellation);
    }

    /// <summary>Reads columns as asked, in the order asked; the same column may be asked for twice, in the same way.</summary>
    public Task<IReadOnlyList<Column>> ReadAsync(string projectId, SourceView source, IReadOnlyList<ColumnRequest> requests, CancellationToken cancellation) =>
        Task.Run<IReadOnlyList<Column>>(() => Read(projectId, source, requests, cancellation), cancellation);

    /// <summary>How a variable enters a model: a 0/1 or measured variable as numbers, every other as categories.</summary>
    public static bool EntersAsNumber(VariableView variable, SourceContents contents) =>
        variable.Numeric && (variable.Kind == VariableKind.Continuous
            || (variable.Kind == VariableKind.Binary && contents.Present(variable.Name, variable.MissingCodes).All(i => contents.Categories(variable.Name)[i] is "0" or "1")));

    private static ColumnRequest Request(VariableView variable, SourceContents contents)
    {
        if (EntersAsNumber(variable, contents))
        {
            return new ColumnRequest(variable.Name, true, variable.MissingCodes);
        }

        if (variable.Distinct == 0)
        {
            throw RefusedException.Invalid($"'{variable.Name}' has no value that is not missing. Leave it out, or look at its missing codes.", variable.Name);
        }

        var categories = contents.Categories(variable.Name);
        if (contents.Reference(variable) is not { } reference)
        {
            throw RefusedException.Invalid(
                $"'{variable.Name}' has {variable.Distinct} distinct values, more than the {MostCategories} with which a categorical variable can enter a model. "
                + "If it is a measured number, describe it as continuous; else leave it out.",
                variable.Name);
        }

        // A category declared missing keeps its place and loses its rows.
        return new ColumnRequest(variable.Name, false, variable.MissingCodes, categories, categories[reference]);
    }

    private Column[] Read(string projectId, SourceView source, IReadOnlyList<ColumnRequest> requests, CancellationToken cancellation)
    {
        var keys = requests.Select(r => $"{projectId}/{source.Id}/{JsonSerializer.Serialize(r, ProjectJson.Options)}").ToList();
        var known = new Dictionary<string, Column>(StringComparer.Ordinal);
        var absent = new List<int>();
        for (var i = 0; i < requests.Count; i++)
        {
            if (cache.Find(keys[i]) is { } held)
            {
                known[keys[i]] = held;
            }
            else if (!absent.Exists(a => keys[a] == keys[i]))
            {
                absent.Add(i);
            }
        }

        if (absent.Count > 0)
        {
            using var stream = vault.Open(projectId, source.Id);
            var table = CsvTable.Read(stream, source.Dialect, [.. absent.Select(i => requests[i])], cancellation);
            foreach (var (place, column) in absent.Zip(table.Columns))
            {
                cache.Put(keys[place], column);
                known[keys[place]] = column;
            }
        }

        return [.. keys.Select(k => known[k])];
    }
}
