namespace ModelLab.Web.Features.Demo;

/// <summary>The demo's tables, which travel inside the program.</summary>
public static class DemoTables
{
    /// <summary>As delivered: one floor area is mistyped.</summary>
    public const string AsDelivered = "marrow-vale-grants.csv";

    /// <summary>With that floor area put right.</summary>
    public const string Corrected = "marrow-vale-grants-corrected.csv";

    /// <summary>Opens a table.</summary>
    /// <exception cref="InvalidOperationException">It does not travel in the program.</exception>
    public static Stream Open(string name) => typeof(DemoTables).Assembly.GetManifestResourceStream(name)
        ?? throw new InvalidOperationException($"The table {name} does not travel in the program.");
}
