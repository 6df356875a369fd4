namespace ModelLab.Web.Features.Demo.Data;

/// <summary>What the grant paid for.</summary>
public enum Measure
{
    /// <summary>Loft insulation.</summary>
    Loft,

    /// <summary>Cavity-wall insulation.</summary>
    CavityWall,

    /// <summary>Loft and cavity wall.</summary>
    Both,

    /// <summary>Solid-wall insulation.</summary>
    SolidWall,
}

/// <summary>What heats the dwelling.</summary>
public enum Heating
{
    /// <summary>Gas boiler.</summary>
    Gas,

    /// <summary>Oil boiler.</summary>
    Oil,

    /// <summary>Storage heaters.</summary>
    StorageHeaters,

    /// <summary>Solid fuel.</summary>
    SolidFuel,
}

/// <summary>One invented dwelling of Marrow Vale, from October to April.</summary>
/// <param name="SavedKwh">Weather-corrected saving of heating energy, kWh; whole.</param>
/// <param name="Measure">What the grant paid for.</param>
/// <param name="FloorAreaM2">Floor area, m²; tenths.</param>
/// <param name="Rooms">Habitable rooms.</param>
/// <param name="Heating">What heats it.</param>
/// <param name="TenureCode">1 owned, 2 private rent, 3 council, 4 housing association.</param>
/// <param name="BaselineMwh">Heating energy in the season before, MWh; hundredths.</param>
/// <param name="SiteDegreeDays">Degree days at the site; whole.</param>
/// <param name="Occupants">People living there.</param>
/// <param name="SetpointChangeC">Change of the thermostat after the grant, °C; halves.</param>
/// <param name="HeatedHours">Heated hours a day; tenths.</param>
/// <param name="DwellingAge">Age in years; whole.</param>
/// <param name="DraughtProofed">Whether draught-proofed before the grant.</param>
/// <param name="DistanceKm">Distance to the contractor's depot, km; tenths.</param>
public sealed record Dwelling(
    double SavedKwh, Measure Measure, double FloorAreaM2, int Rooms, Heating Heating, int TenureCode, double BaselineMwh, double SiteDegreeDays,
    int Occupants, double SetpointChangeC, double HeatedHours, double DwellingAge, bool DraughtProofed, double DistanceKm);
