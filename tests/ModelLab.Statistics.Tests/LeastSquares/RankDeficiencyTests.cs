using ModelLab.Statistics.Designs;

namespace ModelLab.Statistics.Tests.LeastSquares;

public sealed class RankDeficiencyTests
{
    private readonly DataTable table = SampleTable.Create(30, 4, 21, 3);

    [Fact]
    public void A_copy_in_another_unit_is_named_with_its_original() =>
        Refused(With(("copy", row => Value("x2", row) * 1024.0)), ["x1", "x2", "copy"], ("copy", ["x2"]));

    [Fact]
    public void A_shifted_copy_needs_the_intercept() =>
        Refused(WithDecimals("copy", row => 65536m + (decimal)Value("x2", row)), ["x1", "x2", "copy"], ("copy", ["intercept", "x2"]));

    [Fact]
    public void A_total_of_decimals_is_named_with_its_parts() =>
        Refused(WithDecimals("total", row => (decimal)Value("x1", row) + (decimal)Value("x3", row)), ["x1", "x2", "x3", "total"], ("total", ["x1", "x3"]));

    [Fact]
    public void A_total_computed_in_double_is_found_although_its_last_digits_are_off() =>
        Refused(With(("total", row => Value("x1", row) + (Value("x3", row) / 3.0))), ["x1", "x2", "x3", "total"], ("total", ["x1", "x3"]));

    [Fact]
    public void A_number_that_repeats_a_category_is_named_with_its_columns() =>
        Refused(With(("isB", row => Code(row) == 1 ? 1.0 : 0.0)), ["g", "isB"], ("isB", ["g [b]"]));

    [Fact]
    public void Indicators_of_all_categories_add_up_to_the_intercept() => Refused(
        With(("isA", row => Code(row) == 0 ? 1.0 : 0.0), ("isB", row => Code(row) == 1 ? 1.0 : 0.0), ("isC", row => Code(row) == 2 ? 1.0 : 0.0)),
        ["x1", "isA", "isB", "isC"],
        ("isC", ["intercept", "isA", "isB"]));

    [Fact]
    public void Two_deficiencies_are_both_named() => Refused(
        With(("twice", row => Value("x1", row) * 2.0), ("four", row => Value("x2", row) * 4.0)),
        ["x1", "twice", "x2", "x3", "four"],
        ("twice", ["x1"]),
        ("four", ["x2"]));

    [Fact]
    public void The_square_of_a_two_valued_number_is_the_number() =>
        Refused(With(("b", row => row % 2)), ["b", "b^2"], ("b^2", ["b"]));

    [Fact]
    public void The_square_of_plus_and_minus_one_is_the_intercept() =>
        Refused(With(("b", row => row % 2 == 0 ? 1.0 : -1.0)), ["x1", "b", "b^2"], ("b^2", ["intercept"]));

    [Fact]
    public void Without_intercept_a_shifted_copy_is_no_deficiency()
    {
        var model = SampleTable.Model("x2", "copy") with { Intercept = false };
        Assert.Equal(2, ReferenceFit.Fit(WithDecimals("copy", row => 65536m + (decimal)Value("x2", row)), model).Results.Coefficients.Count);
    }

    [Fact]
    public void A_large_level_with_small_differences_is_no_deficiency()
    {
        var moved = WithDecimals("moved", row => 1_000_000_000_000m + (decimal)Value("x2", row));
        var plain = SampleTable.Fit(table, "x1", "x2");
        var fit = SampleTable.Fit(moved, "x1", "moved");
        Assert.Equal(plain.Results.Fit.F!.Value, fit.Results.Fit.F!.Value, plain.Results.Fit.F.Value * 1e-13);
    }

    [Fact]
    public void A_copy_that_differs_in_the_ninth_digit_is_fitted()
    {
        var near = With(("near", row => Value("x1", row) + (1e-8 * Value("x3", row))));
        var direct = SampleTable.Fit(near, "x1", "x3");
        var indirect = SampleTable.Fit(near, "x1", "near");

        // The two pairs span the same plane up to the rounding of the column to double.
        Assert.Equal(direct.Results.Fit.SsResidual, indirect.Results.Fit.SsResidual, direct.Results.Fit.SsResidual * 1e-6);
        Assert.True(indirect.Results.Coefficients[1].Vif > 1e15);
    }

    [Fact]
    public void The_variables_concerned_are_named_without_their_categories_and_powers()
    {
        var doubled = With(("isB", row => Code(row) == 1 ? 1.0 : 0.0), ("two", row => row % 2));
        var exception = Assert.Throws<ModelRefusedException>(() => SampleTable.Fit(doubled, "x1", "g", "isB", "two", "two^2"));
        Assert.Equal(["g", "isB", "two"], exception.Variables);
    }

    private double Value(string name, int row) => ((NumberColumn)table.Find(name)!).Values[row];

    private int Code(int row) => ((CategoryColumn)table.Find("g")!).Codes[row];

    private DataTable With(params (string Name, Func<int, double> Value)[] added) => new(
        [.. table.Columns, .. added.Select(one => (Column)new NumberColumn(one.Name, [.. Enumerable.Range(0, table.Rows).Select(one.Value)]))]);

    // Both the parts and the total as the decimals that are written.
    private DataTable WithDecimals(string name, Func<int, decimal> value) => new(
    [
        .. table.Columns.Select(column => column is NumberColumn numbers
            ? FixtureTable.Numbers(column.Name, [.. numbers.Values.ToArray().Select(number => number.ToString(System.Globalization.CultureInfo.InvariantCulture))])
            : column),
        FixtureTable.Numbers(name, [.. Enumerable.Range(0, table.Rows).Select(row => value(row).ToString(System.Globalization.CultureInfo.InvariantCulture))]),
    ]);

    private static void Refused(DataTable table, string[] terms, params (string Column, string[] By)[] aliases)
    {
        var exception = Assert.Throws<ModelRefusedException>(() => SampleTable.Fit(table, terms));
        Assert.Equal(ModelRefusal.RankDeficient, exception.Refusal);
        Assert.Equal(aliases.Select(alias => alias.Column), exception.Aliases.Select(alias => alias.Column));
        Assert.All(aliases.Zip(exception.Aliases), pair => Assert.Equal(pair.First.By, pair.Second.DeterminedBy));
        Assert.All(aliases, alias => Assert.Contains($"'{alias.Column}' is determined by", exception.Message, StringComparison.Ordinal));
    }
}
