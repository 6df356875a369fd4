using ModelLab.Intake;
using ModelLab.Ledger;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Description;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Modelling;

/// <summary>Columns and rows on which the models of a path are fitted.</summary>
/// <param name="Source">The source of the dataset.</param>
/// <param name="Dictionary">The dictionary in force on the path.</param>
/// <param name="Preparation">The preparation in force, or null.</param>
/// <param name="Table">Outcome and all variables of the candidates.</param>
/// <param name="Rows">Zero-based rows analysed, ascending: not excluded, and complete on the outcome and all candidates.</param>
/// <param name="Facts">Their number and hash, and what missing values cost.</param>
/// <param name="RowsContent">The row numbers, to be kept under their hash.</param>
public sealed record AnalysisData(
    SourceView Source, DataDictionary Dictionary, PreparationView? Preparation, DataTable Table, int[] Rows, AnalysedRows Facts, KeptContent RowsContent)
{
    private readonly Lazy<IReadOnlyList<Correlation>> correlations = new(
        () => Correlations.Pearson([.. Table.Columns.OfType<NumberColumn>()], Rows, confidence: 0.95));

    /// <summary>Correlations of the numeric variables named on the rows analysed, pair by pair. All pairs are computed once for all models on them.</summary>
    public IReadOnlyList<Correlation> CorrelationsAmong(IReadOnlySet<string> names) =>
        [.. correlations.Value.Where(c => names.Contains(c.First) && names.Contains(c.Second))];
}

/// <summary>Loads what a path's models are fitted on.</summary>
public sealed class AnalysisDataLoader(IReadModelSource store, ISourceVault vault, DatasetColumns columns)
{
    /// <summary>Loads the data of a plan under a preparation.</summary>
    /// <exception cref="RefusedException">A variable is unknown, of a kind that cannot enter, or no row is left.</exception>
    public Task<AnalysisData> LoadAsync(string projectId, PathPlan plan, PreparationView? preparation, CancellationToken cancellation) =>
        LoadAsync(projectId, plan, preparation, null, cancellation);

    /// <summary>The same under a preparation that is not recorded yet, with the names of its new categories.</summary>
    public async Task<AnalysisData> LoadAsync(string projectId, PathPlan plan, PreparationView? preparation, CategoryLabels? labels, CancellationToken cancellation)
    {
        var state = await store.ReadAsync(
            projectId,
            m =>
            {
                var dataset = m.Find<DatasetView>(plan.DatasetId) ?? throw RefusedException.NotFound("such dataset");
                return new State(
                    DataDictionary.At(m, dataset, plan.DictionaryEntry),
                    preparation is null ? null : DataDictionary.At(m, dataset, preparation.DictionaryEntry),
                    m.Find<SourceView>(dataset.SourceId)!);
            },
            cancellation);
        return await LoadAsync(projectId, plan, preparation, labels, state, cancellation);
    }

    private async Task<AnalysisData> LoadAsync(
        string projectId, PathPlan plan, PreparationView? preparation, CategoryLabels? labels, State state, CancellationToken cancellation)
    {
        var (dictionary, preparationDictionary, source) = state;
        var names = plan.Candidates.SelectMany(t => t.Variables).Prepend(plan.Outcome).Distinct(StringComparer.Ordinal).ToList();
        var derived = preparation is null
            ? DerivedColumns.None
            : await DerivedColumns.OpenAsync(vault, projectId, preparation, labels, preparationDictionary!, cancellation);
        foreach (var name in names.Where(n => !derived.Makes(n)))
        {
            RequireKind(dictionary, name, name == plan.Outcome);
        }

        if (derived.Makes(plan.Outcome))
        {
            throw RefusedException.Invalid($"'{plan.Outcome}' is categorical; least squares needs a measured outcome.", plan.Outcome);
        }

        var read = (await columns.ReadAsync(projectId, source, dictionary, [.. names.Where(n => !derived.Makes(n))], cancellation)).ToDictionary(c => c.Name, StringComparer.Ordinal);
        if (read[plan.Outcome] is CategoryColumn)
        {
            throw RefusedException.Invalid(
                $"'{plan.Outcome}' is described as binary and is not written as 0 and 1; least squares needs numbers. Describe it as continuous if its codes are the numbers that you mean.", plan.Outcome);
        }

        foreach (var column in await derived.ReadAsync(columns, projectId, source, names, cancellation))
        {
            read.Add(column.Name, column);
        }

        var table = new DataTable([.. names.Select(n => read[n])]);
        var kept = await KeptRows.ApplyAsync(columns, projectId, source, preparation, preparationDictionary, cancellation);
        var complete = CompleteRows.Find(table.Columns, kept);
        if (complete.Rows.Length == 0)
        {
            throw RefusedException.Invalid(
                kept.Length == 0
                    ? "The preparation leaves no row."
                    : "No row is complete on the outcome and all candidate terms. Leave out the variables that are missing most: "
                        + string.Join(", ", complete.Losses.OrderByDescending(l => l.Missing).Take(5).Select(l => $"{l.Variable} ({l.Missing} missing)")) + ".");
        }

        var content = RowNumbers.Write(complete.Rows);
        var hash = Sha256Hash.Of(content);
        return new AnalysisData(
            source, dictionary, preparation, table, complete.Rows,
            new AnalysedRows(complete.Rows.Length, hash, complete.Losses), new KeptContent(hash, source.Id, content));
    }

    private static void RequireKind(DataDictionary dictionary, string name, bool outcome)
    {
        var variable = dictionary.Find(name) ?? throw RefusedException.Invalid(
            $"There is no variable '{name}'. There are: {string.Join(", ", dictionary.Variables.Take(40).Select(v => v.Name))}.", name);
        if (outcome && (variable.Kind is not (VariableKind.Continuous or VariableKind.Binary) || !variable.Numeric))
        {
            throw RefusedException.Invalid(
                $"'{name}' is described as {Word(variable.Kind)}{(variable.Numeric ? string.Empty : " and is not all numbers")}; least squares needs a measured outcome. "
                + "If it is a measurement, describe it as continuous first; an outcome in categories needs another method than this program offers.",
                name);
        }

        if (!outcome && variable.Kind is VariableKind.Identifier or VariableKind.Date)
        {
            throw RefusedException.Invalid($"'{name}' is described as {Word(variable.Kind)} and cannot be a term. Describe it as continuous or categorical if it is one.", name);
        }

        if (!outcome && variable is { Kind: VariableKind.Continuous, Numeric: false })
        {
            throw RefusedException.Invalid($"'{name}' is described as continuous but is not all numbers. Declare the texts in it as missing codes, or describe it as categorical.", name);
        }
    }

    private static string Word(VariableKind kind) => kind switch
    {
        VariableKind.Identifier => "an identifier",
        VariableKind.Date => "a date",
        VariableKind.Categorical => "categorical",
        VariableKind.Ordered => "ordered",
        VariableKind.Binary => "binary",
        _ => "continuous",
    };

    private sealed record State(DataDictionary Dictionary, DataDictionary? PreparationDictionary, SourceView Source);
}
