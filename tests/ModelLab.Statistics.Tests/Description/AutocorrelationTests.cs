using ModelLab.Statistics.Description;
using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Description;

public class AutocorrelationTests
{
    [Fact]
    public void A_missing_row_takes_its_two_products_away()
    {
        // mean of 1, 2, 6 is 3: deviations −2, −1, ·, 3; products (−2)(−1) = 2, none with the gap; squares 14
        Assert.Equal(2.0 / 14, Autocorrelation.Lag1(new NumberColumn("x", [1, 2, double.NaN, 6])));
        // without the gap (−1)(3) comes in
        Assert.Equal(-1.0 / 14, Autocorrelation.Lag1(new NumberColumn("x", [1, 2, 6])));
    }

    [Fact]
    public void A_single_value_has_none() => Assert.Null(Autocorrelation.Lag1(new NumberColumn("x", [4, double.NaN])));
}
