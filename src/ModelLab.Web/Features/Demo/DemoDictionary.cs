using ModelLab.Intake;
using ModelLab.Projects.Datasets;

namespace ModelLab.Web.Features.Demo;

/// <summary>A description for one variable.</summary>
/// <param name="Variable">Its name.</param>
/// <param name="Change">What is said of it.</param>
public sealed record DemoDescription(string Variable, VariableChange Change);

/// <summary>How the analyst describes the variables of the grants register.</summary>
public static class DemoDictionary
{
    private const string FromRegister = "Checked against the guide to the grants register.";

    /// <summary>All variables, as described right after the upload. Tenure is taken for a number, as the register delivers it.</summary>
    public static IReadOnlyList<DemoDescription> AtFirst { get; } =
    [
        new("dwelling_id", Say("Dwelling", null, VariableKind.Identifier)),
        new("saved_kwh", Say("Heating energy saved, October to April", "kWh", VariableKind.Continuous, note: "Weather-corrected: last winter's use less this winter's.")),
        new("measure", Say("Measure that the grant paid for", null, VariableKind.Categorical, reference: "loft", reason: "Loft insulation is the cheapest and commonest measure; the others are read against it.")),
        new("floor_area_m2", Say("Floor area", "m²", VariableKind.Continuous, note: "Typed from the paper form.")),
        new("rooms", Say("Habitable rooms", null, VariableKind.Continuous, reason: "A true count of rooms, not a code.")),
        new("heating", Say("Main heating", null, VariableKind.Categorical, reference: "gas", reason: "Gas heats most of the homes.")),
        new("tenure_code", Say("Tenure", null, VariableKind.Continuous, reason: "Delivered as a number, and the code list is not to hand yet. Taken as it came, to see the data first.")),
        new("baseline_mwh", Say("Heating energy in the winter before", "MWh", VariableKind.Continuous, note: "October to April before the grant.")),
        new("site_degree_days", Say("Degree days at the site", "K d", VariableKind.Continuous)),
        new("occupants", Say("Occupants", null, VariableKind.Continuous, note: "Asked by letter; missing where nobody answered.", reason: "A true count of people, not a code.")),
        new("setpoint_change_c", Say("Change of the thermostat setting", "°C", VariableKind.Continuous, note: "After the grant, so it may be a consequence of the measure. Missing where the logger failed.", reason: "Half degrees; measured, not coded.")),
        new("heated_hours", Say("Heated hours a day", "h", VariableKind.Continuous)),
        new("dwelling_age", Say("Age of the dwelling", "years", VariableKind.Continuous)),
        new("draught_proofed", Say("Draught-proofed before the grant", null, VariableKind.Binary, reference: "no", reason: "Two answers on the form.")),
        new("distance_km", Say("Distance to the installer's depot", "km", VariableKind.Continuous)),
    ];

    /// <summary>Tenure once the code list has come.</summary>
    public static VariableChange TenureAsCategory { get; } = Say(
        "Tenure", null, VariableKind.Categorical, reference: "1", note: "1 owner-occupied, 2 private rent, 3 council, 4 housing association.",
        reason: "The grants office has sent the code list: 1 to 4 name kinds of tenure in no order, so that a slope over them means nothing.");

    private static VariableChange Say(
        string label, string? unit, VariableKind kind, string? reference = null, string? note = null, string reason = FromRegister) =>
        new(label, unit, kind, null, reference, note, reason);
}
