namespace ModelLab.Web.Features.Demo.Data;

/// <summary>Draws one dwelling, variable after variable in a fixed order; each is rounded as the file shows it before anything depends on it.</summary>
public static class DwellingDraw
{
    private static readonly double[] MeasureShares = [0.34, 0.30, 0.22, 0.14];
    private static readonly double[] HeatingShares = [0.62, 0.14, 0.17, 0.07];
    private static readonly double[] TenureShares = [0.48, 0.17, 0.20, 0.15];

    // Warmer walls invite a warmer room: mean change of the setpoint by measure, °C.
    private static readonly double[] SetpointMeans = [0.1, 0.2, 0.3, 0.5];

    /// <summary>Draws a dwelling with its saving.</summary>
    public static Dwelling Draw(Variates draw)
    {
        var measure = draw.Pick(MeasureShares);
        var area = draw.LogNormal(88, 0.30, 38, 210);
        var rooms = Math.Clamp((int)Variates.Round(0.6 + (0.043 * area) + (0.62 * draw.Normal()), 1), 2, 9);
        var heating = draw.Pick(HeatingShares);
        var tenure = 1 + draw.Pick(TenureShares);
        var occupants = 1 + draw.Binomial(6, 0.24);
        var hours = draw.LogNormal(10, 0.42, 3, 24);
        var age = Age(draw);
        var degreeDays = Variates.Round(2250 + (140 * draw.Normal()), 1);
        var expected = 13.5 + (0.085 * (area - 88)) + (0.45 * (occupants - 2.4)) + (1.8 * Math.Log(hours / 10))
            + (0.02 * (age - 56)) + (0.0025 * (degreeDays - 2250));
        var baseline = Math.Max(4, Variates.Round(expected * Math.Exp(0.17 * draw.Normal()), 100));
        var setpoint = Variates.Round(SetpointMeans[measure] + (0.55 * draw.Normal()), 2);
        var draughtProofed = draw.Happens(0.35);
        var distance = draw.LogNormal(11, 0.7, 0.1, 60);
        var dwelling = new Dwelling(
            0, (Measure)measure, area, rooms, (Heating)heating, tenure, baseline, degreeDays, occupants, setpoint, hours, age, draughtProofed, distance);
        return dwelling with { SavedKwh = Variates.Round(TrueModel.Mean(dwelling) + (TrueModel.ErrorDeviation(dwelling) * draw.Normal()), 1) };
    }

    private static double Age(Variates draw)
    {
        while (true)
        {
            var age = Variates.Round(draw.Gamma(4, 14), 1);
            if (age is >= 8 and <= 140)
            {
                return age;
            }
        }
    }
}
