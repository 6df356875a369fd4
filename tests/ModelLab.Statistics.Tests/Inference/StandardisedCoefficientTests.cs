using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.Inference;

/// <summary>Standardised coefficients against fits of variables that were standardised first.</summary>
public sealed class StandardisedCoefficientTests
{
    private readonly DataTable table = SampleTable.Create(50, 2, 81, 3);

    [Fact]
    public void Coefficients_are_those_of_standardised_variables()
    {
        var expected = SampleTable.Fit(Standardised(), "x1", "x2").Results.Coefficients;
        var actual = SampleTable.Fit(table, "x1", "x2").Results.Coefficients;
        Assert.Null(actual[0].Standardized);
        Assert.Equal(expected[1].Estimate, actual[1].Standardized!.Value, 1e-14);
        Assert.Equal(expected[2].Estimate, actual[2].Standardized!.Value, 1e-14);
    }

    [Fact]
    public void Powers_are_those_of_the_standardised_variable()
    {
        var expected = SampleTable.Fit(Standardised(), "x1^3", "x2", "x1", "x1^2").Results.Coefficients;
        var actual = SampleTable.Fit(table, "x1^3", "x2", "x1", "x1^2").Results.Coefficients;
        for (var column = 1; column <= 4; column++)
        {
            Assert.Equal(expected[column].Estimate, actual[column].Standardized!.Value, 1e-12);
        }
    }

    [Fact]
    public void Powers_without_all_lower_ones_and_categories_have_none()
    {
        var results = SampleTable.Fit(table, "x1", "x1^3", "x2", "g").Results.Coefficients;
        Assert.Equal([true, true, false, true, true], results.Skip(1).Select(c => c.Standardized is null));
    }

    private DataTable Standardised() => new([.. table.Columns.Select(column => column is NumberColumn number ? Standardised(number) : column)]);

    private static NumberColumn Standardised(NumberColumn column)
    {
        var values = column.Values.ToArray();
        var mean = values.Average();
        var deviation = Math.Sqrt(values.Sum(v => (v - mean) * (v - mean)) / (values.Length - 1));
        return new NumberColumn(column.Name, [.. values.Select(v => (v - mean) / deviation)]);
    }
}
