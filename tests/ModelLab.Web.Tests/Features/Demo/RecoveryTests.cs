using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Distributions;
using ModelLab.Statistics.Inference;
using ModelLab.Web.Features.Demo.Data;
using Xunit;

namespace ModelLab.Web.Tests.Features.Demo;

// The true design is fitted to undamaged data. Each row is divided by its true error SD, so that the errors are as the
// intervals suppose them (independent, normal, of one variance) and coverage is exactly the confidence level.
public sealed class RecoveryTests
{
    private const int Seeds = 500;
    private const double Confidence = 0.95;

    private static readonly IReadOnlyList<PlannedColumn> Design = Columns();

    [Fact]
    public void Intervals_cover_the_true_effects_as_often_as_they_claim()
    {
        var covered = new int[Design.Count];
        var shares = new double[Seeds];
        for (var i = 0; i < Seeds; i++)
        {
            var results = Fit(MarrowVale.Undamaged((ulong)(10_001 + i)), Design);
            for (var j = 0; j < Design.Count; j++)
            {
                covered[j] += Covers(results.Coefficients[j], Design[j].Effect) ? 1 : 0;
                shares[i] += Covers(results.Coefficients[j], Design[j].Effect) ? 1.0 / Design.Count : 0;
            }
        }

        // Monte-Carlo error: of one coefficient √(.95 · .05/500) = .0097, taken 3.5 times for 20 of them; of the mean share from
        // the spread between seeds, taken 3 times.
        var one = Math.Sqrt(Confidence * (1 - Confidence) / Seeds);
        for (var j = 0; j < Design.Count; j++)
        {
            Assert.True(Math.Abs((covered[j] / (double)Seeds) - Confidence) < 3.5 * one, $"{Design[j].Name}: {covered[j]} of {Seeds} intervals cover {Design[j].Effect}.");
        }

        var mean = shares.Average();
        var spread = Math.Sqrt(shares.Sum(s => (s - mean) * (s - mean)) / (Seeds - 1) / Seeds);
        Assert.True(Math.Abs(mean - Confidence) < 3 * spread, $"Mean coverage {mean}, Monte-Carlo error {spread}.");
    }

    [Fact]
    public void A_model_without_the_setpoint_change_covers_the_total_effect_and_misses_the_direct_one()
    {
        var without = Design.Where(c => c.Name != "setpoint_change_c").ToList();
        var solidWall = without.FindIndex(c => c.Name == "measure [solid wall]");
        var direct = 0;
        var total = 0;
        for (var i = 0; i < 100; i++)
        {
            var coefficient = Fit(MarrowVale.Undamaged((ulong)(10_001 + i)), without).Coefficients[solidWall];
            direct += Covers(coefficient, 1900) ? 1 : 0;
            total += Covers(coefficient, 1660) ? 1 : 0;
        }

        Assert.True(total >= 85 && direct <= 50, $"Of 100 intervals {total} cover the total effect and {direct} the direct one.");
    }

    [Fact]
    public void The_true_effects_lie_in_the_joint_region_of_the_shipped_seed()
    {
        var dwellings = MarrowVale.Undamaged(MarrowVale.Seed);
        var fit = Fit(dwellings, Design).Fit;

        // (RSS at the truth − RSS) / (p s²) is F on (p, n − p); at the truth the residuals are the errors themselves.
        var atTruth = dwellings.Sum(d => Math.Pow((d.SavedKwh - TrueModel.Mean(d)) / TrueModel.ErrorDeviation(d), 2));
        var f = (atTruth - fit.SsResidual) / (Design.Count * fit.S * fit.S);
        Assert.True(f > 0);
        Assert.True(FisherF.UpperTail(f, Design.Count, fit.DfResidual) > 1 - Confidence, $"F = {f} on {Design.Count} and {fit.DfResidual}.");
    }

    private static bool Covers(CoefficientResult coefficient, double effect) => coefficient.Lower <= effect && effect <= coefficient.Upper;

    private static ModelResults Fit(IReadOnlyList<Dwelling> dwellings, IReadOnlyList<PlannedColumn> columns)
    {
        double[] Weighted(Func<Dwelling, double> value) => [.. dwellings.Select(d => value(d) / TrueModel.ErrorDeviation(d))];
        var table = new DataTable([new NumberColumn("saved_kwh", Weighted(d => d.SavedKwh)), .. columns.Select(c => new NumberColumn(c.Name, Weighted(c.Value)))]);
        var specification = new ModelSpecification("saved_kwh", [.. columns.Select(c => new VariableTerm(c.Name))], Intercept: false);
        var design = ModelLab.Statistics.Designs.Design.Create(table, specification, [.. Enumerable.Range(0, dwellings.Count)]);
        return ModelFitter.Fit(design, new FitOptions(Confidence, [])).Results;
    }

    // The columns of the true design about its reference point, each with its true effect; the intercept is one of them.
    private static List<PlannedColumn> Columns() =>
    [
        new("intercept", TrueModel.Intercept, _ => 1),
        new("log heated_hours", TrueModel.LogHours, d => Math.Log(d.HeatedHours / 10)),
        .. TrueModel.Effects.Select(e => new PlannedColumn(e.Category is null ? e.Variable : $"{e.Variable} [{e.Category}]", e.Effect, Value(e))),
    ];

    private static Func<Dwelling, double> Value(TrueEffect effect) => effect.Variable switch
    {
        "measure" => d => GrantsTable.Text(d.Measure) == effect.Category ? 1 : 0,
        "heating" => d => GrantsTable.Text(d.Heating) == effect.Category ? 1 : 0,
        "tenure_code" => d => $"{d.TenureCode}" == effect.Category ? 1 : 0,
        "draught_proofed" => d => d.DraughtProofed ? 1 : 0,
        "floor_area_m2" => d => d.FloorAreaM2 - 88,
        "rooms" => d => d.Rooms,
        "baseline_mwh" => d => d.BaselineMwh - 14,
        "site_degree_days" => d => d.SiteDegreeDays - 2250,
        "occupants" => d => d.Occupants - 2,
        "setpoint_change_c" => d => d.SetpointChangeC,
        "dwelling_age" => d => d.DwellingAge - 56,
        "distance_km" => d => d.DistanceKm,
        _ => throw new ArgumentException($"{effect.Variable} is no variable of the true model.", nameof(effect)),
    };

    private sealed record PlannedColumn(string Name, double Effect, Func<Dwelling, double> Value);
}
