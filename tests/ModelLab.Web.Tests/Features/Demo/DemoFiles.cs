using ModelLab.Intake.Csv;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Web.Features.Demo.Data;

namespace ModelLab.Web.Tests.Features.Demo;

/// <summary>The shipped tables as they travel in the program, and models fitted to them.</summary>
internal static class DemoFiles
{
    public const string Damaged = "marrow-vale-grants.csv";
    public const string Corrected = "marrow-vale-grants-corrected.csv";

    /// <summary>The candidates of the plan: all but the setpoint change, which comes after the grant.</summary>
    public static readonly string[] Candidates =
    [
        "measure", "floor_area_m2", "rooms", "heating", "tenure_code", "baseline_mwh", "site_degree_days", "occupants",
        "heated_hours", "dwelling_age", "draught_proofed", "distance_km",
    ];

    private static readonly CsvDialect Dialect = new("utf-8", false, ',', '.');

    public static Stream Open(string name) => typeof(MarrowVale).Assembly.GetManifestResourceStream(name)
        ?? throw new InvalidOperationException($"{name} does not travel in the program.");

    public static string Text(string name)
    {
        using var reader = new StreamReader(Open(name));
        return reader.ReadToEnd();
    }

    public static DataTable Read(string name, bool tenureAsNumber)
    {
        using var stream = Open(name);
        return CsvTable.Read(
            stream,
            Dialect,
            [.. GrantsTable.Header.Split(',').Skip(1).Select(column => column switch
            {
                "measure" => new ColumnRequest(column, false, [""], ["loft", "cavity wall", "both", "solid wall"]),
                "heating" => new ColumnRequest(column, false, [""], ["gas", "oil", "storage heaters", "solid fuel"]),
                "draught_proofed" => new ColumnRequest(column, false, [""], ["no", "yes"]),
                "tenure_code" when !tenureAsNumber => new ColumnRequest(column, false, [""], ["1", "2", "3", "4"]),
                _ => new ColumnRequest(column, true, [""]),
            })]);
    }

    /// <summary>Fits the terms on the rows that are complete in the candidates of the plan and in the terms.</summary>
    public static FittedModel Fit(DataTable table, params IReadOnlyList<string> terms)
    {
        var needed = Candidates.Union(terms).Select(t => table.Find(t)!).ToList();
        var rows = Enumerable.Range(0, table.Rows).Where(row => !needed.Any(c => c.IsMissing(row))).ToArray();
        var design = Design.Create(table, new ModelSpecification("saved_kwh", [.. terms.Select(t => new VariableTerm(t))]), rows);
        return ModelFitter.Fit(design, new FitOptions(0.95, []));
    }

    public static CoefficientResult Coefficient(this FittedModel model, string variable, string? category = null) =>
        model.Results.Coefficients.Single(c => c.Term?.Variables[0] == variable && c.Category == category);

    public static TermResult Term(this FittedModel model, string variable) => model.Results.Terms.Single(t => t.Term.Variables[0] == variable);
}
