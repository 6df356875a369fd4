using ModelLab.Statistics.Description;
using ModelLab.Statistics.Designs;
using Xunit;

namespace ModelLab.Web.Tests.Features.Demo;

// The figures come from numpy 1.24.2 and statsmodels 0.13.5 (ordinary least squares), fitted to the shipped tables.
public sealed class MarrowValeStoryTests
{
    private const double Close = 1e-8;

    private static readonly DataTable Damaged = DemoFiles.Read(DemoFiles.Damaged, tenureAsNumber: true);
    private static readonly DataTable Corrected = DemoFiles.Read(DemoFiles.Corrected, tenureAsNumber: false);

    [Fact]
    public void Savings_have_the_planned_mean_and_spread()
    {
        var saved = ((NumberColumn)Corrected.Find("saved_kwh")!).Values.ToArray();
        var mean = saved.Average();
        Assert.Equal(2626.2883333333334, mean, 1e-9);
        Assert.Equal(1127.429021651471, Math.Sqrt(saved.Sum(y => (y - mean) * (y - mean)) / (saved.Length - 1)), 1e-9);
    }

    [Fact]
    public void With_the_area_mistyped_rooms_seem_to_matter_and_area_does_not()
    {
        var full = DemoFiles.Fit(Damaged, DemoFiles.Candidates);
        Assert.Equal(563, full.Results.Fit.N);
        Assert.Equal(0.647770640889, full.Results.Fit.RSquared, 1e-11);
        Assert.Equal(8960.663108, full.Results.Fit.Aic!.Value, 1e-5);
        Assert.Equal(0.000154832993, full.Coefficient("rooms").P!.Value, Close);
        Assert.Equal(0.2238197418, full.Coefficient("floor_area_m2").P!.Value, Close);
        var leverage = full.Rows().Leverage;
        Assert.Equal(0.8978543362329223, leverage.Max(), Close);
    }

    [Fact]
    public void The_mistyped_area_hides_that_area_and_rooms_go_together()
    {
        Assert.Equal(0.5608759568321476, AreaAndRooms(Damaged), 1e-10);
        Assert.Equal(0.8740962915453495, AreaAndRooms(Corrected), 1e-10);
    }

    [Fact]
    public void Tenure_says_nothing_as_a_number_and_much_as_a_category()
    {
        Assert.Equal(0.2068134107, DemoFiles.Fit(Damaged, DemoFiles.Candidates).Coefficient("tenure_code").P!.Value, Close);
        var tenure = DemoFiles.Fit(Corrected, DemoFiles.Candidates).Term("tenure_code");
        Assert.Equal(3, tenure.Df);
        Assert.Equal(18.818647, tenure.F!.Value, 1e-5);
    }

    [Fact]
    public void With_the_area_right_area_matters_and_rooms_and_distance_can_leave()
    {
        var full = DemoFiles.Fit(Corrected, DemoFiles.Candidates);
        Assert.Equal(0.686573508884, full.Results.Fit.RSquared, 1e-11);
        Assert.Equal(0.8709983417, full.Coefficient("rooms").P!.Value, Close);
        Assert.Equal(0.0001011688324, full.Coefficient("floor_area_m2").P!.Value, Close);

        var withoutRooms = DemoFiles.Fit(Corrected, [.. DemoFiles.Candidates.Except(["rooms"])]);
        Assert.Equal(0.2026765936, withoutRooms.Coefficient("distance_km").P!.Value, Close);
    }

    [Fact]
    public void Without_rooms_and_distance_dwelling_age_is_borderline()
    {
        var reduced = DemoFiles.Fit(Corrected, [.. DemoFiles.Candidates.Except(["rooms", "distance_km"])]);
        Assert.Equal(0.06646705451, reduced.Coefficient("dwelling_age").P!.Value, Close);
        Assert.Equal(8896.656484, reduced.Results.Fit.Aic!.Value, 1e-5);
    }

    [Fact]
    public void The_setpoint_change_improves_the_fit_and_shows_the_direct_effect()
    {
        var terms = DemoFiles.Candidates.Except(["rooms", "distance_km"]);
        var without = DemoFiles.Fit(Corrected, [.. terms]);
        var with = DemoFiles.Fit(Corrected, [.. terms, "setpoint_change_c"]);
        Assert.Equal(542, with.Results.Fit.N);
        Assert.Equal(0.773825849842, with.Results.Fit.RSquared, 1e-11);
        Assert.Equal(1868.72498893, with.Coefficient("measure", "solid wall").Estimate, 1e-6);
        Assert.Equal(1603.01876171, without.Coefficient("measure", "solid wall").Estimate, 1e-6);
    }

    private static double AreaAndRooms(DataTable table) =>
        Correlations.Pearson([(NumberColumn)table.Find("floor_area_m2")!, (NumberColumn)table.Find("rooms")!], [], 0.95)[0].R!.Value;
}
