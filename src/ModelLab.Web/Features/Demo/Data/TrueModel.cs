namespace ModelLab.Web.Features.Demo.Data;

/// <summary>One effect of the true model.</summary>
/// <param name="Variable">Column of the data.</param>
/// <param name="Category">Category compared with the reference, or null where the effect is per unit.</param>
/// <param name="Effect">kWh.</param>
public sealed record TrueEffect(string Variable, string? Category, double Effect);

/// <summary>How the saving of a dwelling comes about in truth. The same figures stand in <c>marrow-vale-true-model.md</c>.</summary>
public static class TrueModel
{
    /// <summary>Saving in kWh at the reference point: loft, gas, tenure 1, 88 m², 14 MWh, 2,250 degree days, 2 occupants, no change of setpoint, 10 hours, 56 years, not draught-proofed.</summary>
    public const double Intercept = 1900;

    /// <summary>kWh for a doubling of heated hours is 700 · ln 2: the effect is of the logarithm.</summary>
    public const double LogHours = 700;

    /// <summary>All effects but that of heated hours, which bends; zero where a variable does nothing.</summary>
    public static IReadOnlyList<TrueEffect> Effects { get; } =
    [
        new("measure", "cavity wall", 900), new("measure", "both", 1500), new("measure", "solid wall", 1900),
        new("floor_area_m2", null, 9), new("rooms", null, 0),
        new("heating", "oil", 300), new("heating", "storage heaters", -350), new("heating", "solid fuel", -450),
        new("tenure_code", "2", -380), new("tenure_code", "3", 120), new("tenure_code", "4", -80),
        new("baseline_mwh", null, 100), new("site_degree_days", null, 0.9), new("occupants", null, -90), new("setpoint_change_c", null, -600),
        new("dwelling_age", null, 1.7), new("draught_proofed", "yes", 160), new("distance_km", null, 0),
    ];

    /// <summary>Expected saving of a dwelling, kWh.</summary>
    public static double Mean(Dwelling dwelling) => Intercept
        + Of("measure", GrantsTable.Text(dwelling.Measure)) + Of("heating", GrantsTable.Text(dwelling.Heating)) + Of("tenure_code", $"{dwelling.TenureCode}")
        + (Of("floor_area_m2") * (dwelling.FloorAreaM2 - 88)) + (Of("baseline_mwh") * (dwelling.BaselineMwh - 14))
        + (Of("site_degree_days") * (dwelling.SiteDegreeDays - 2250)) + (Of("occupants") * (dwelling.Occupants - 2))
        + (Of("setpoint_change_c") * dwelling.SetpointChangeC) + (LogHours * Math.Log(dwelling.HeatedHours / 10))
        + (Of("dwelling_age") * (dwelling.DwellingAge - 56)) + (dwelling.DraughtProofed ? Of("draught_proofed", "yes") : 0);

    /// <summary>SD of the error of a dwelling, kWh: larger where more is burnt.</summary>
    public static double ErrorDeviation(Dwelling dwelling) => 560 * Math.Pow(dwelling.BaselineMwh / 14, 0.8);

    // 0 for a reference category, which has no line of its own.
    private static double Of(string variable, string? category = null) =>
        Effects.FirstOrDefault(e => e.Variable == variable && e.Category == category)?.Effect ?? 0;
}
