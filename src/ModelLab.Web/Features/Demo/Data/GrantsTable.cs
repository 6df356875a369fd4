using System.Globalization;
using System.Text;

namespace ModelLab.Web.Features.Demo.Data;

/// <summary>The grants file as text: comma-separated, line feeds, the empty cell where a value is missing.</summary>
public static class GrantsTable
{
    /// <summary>The header line.</summary>
    public const string Header = "dwelling_id,saved_kwh,measure,floor_area_m2,rooms,heating,tenure_code,baseline_mwh,site_degree_days,occupants,setpoint_change_c,heated_hours,dwelling_age,draught_proofed,distance_km";

    /// <summary>Writes the rows.</summary>
    /// <param name="rows">The rows.</param>
    /// <param name="corrected">False: the mistyped floor area as it was first typed.</param>
    public static string Write(IEnumerable<GrantRow> rows, bool corrected)
    {
        var text = new StringBuilder().Append(Header).Append('\n');
        foreach (var row in rows)
        {
            var dwelling = row.Dwelling;
            text.AppendJoin(
                ',',
                string.Create(CultureInfo.InvariantCulture, $"MV{row.Number:0000}"),
                Number(dwelling.SavedKwh, "0"),
                Text(dwelling.Measure),
                row.AreaMistyped && !corrected ? Number(dwelling.FloorAreaM2 * 10, "0") : Number(dwelling.FloorAreaM2, "0.0"),
                Number(dwelling.Rooms, "0"),
                Text(dwelling.Heating),
                Number(dwelling.TenureCode, "0"),
                Number(dwelling.BaselineMwh, "0.00"),
                Number(dwelling.SiteDegreeDays, "0"),
                row.OccupantsMissing ? string.Empty : Number(dwelling.Occupants, "0"),
                row.SetpointMissing ? string.Empty : Number(dwelling.SetpointChangeC, "0.0"),
                Number(dwelling.HeatedHours, "0.0"),
                Number(dwelling.DwellingAge, "0"),
                dwelling.DraughtProofed ? "yes" : "no",
                Number(dwelling.DistanceKm, "0.0"));
            text.Append('\n');
        }

        return text.ToString();
    }

    /// <summary>A measure as the file names it.</summary>
    public static string Text(Measure measure) => measure switch
    {
        Measure.Loft => "loft",
        Measure.CavityWall => "cavity wall",
        Measure.Both => "both",
        _ => "solid wall",
    };

    /// <summary>A heating as the file names it.</summary>
    public static string Text(Heating heating) => heating switch
    {
        Heating.Gas => "gas",
        Heating.Oil => "oil",
        Heating.StorageHeaters => "storage heaters",
        _ => "solid fuel",
    };

    private static string Number(double value, string format) => value.ToString(format, CultureInfo.InvariantCulture);
}
