using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Designs;

public sealed class DesignTests
{
    private static readonly DataTable Table = new(
    [
        SampleTable.Number("y", 1, 3, 2, 5, 4, 7, 6),
        SampleTable.Number("x", 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.8),
        SampleTable.Number("flat", 2, 2, 2, 2, 2, 2, 3),
        SampleTable.Number("hole", 1, double.NaN, 3, 4, double.PositiveInfinity, 6, 9),
        SampleTable.Category("g", "aabbccd", "abcd", 1),
        SampleTable.Category("holes", "ab?bbab", "ab"),
    ]);

    [Fact]
    public void Columns_stand_in_the_order_of_the_terms_after_the_intercept()
    {
        var design = Design.Create(Table, SampleTable.Model("x", "x^2", "g"), [0, 1, 2, 3, 4, 5, 6]);
        Assert.Equal(["intercept", "x", "x^2", "g [a]", "g [c]", "g [d]"], design.Columns.Select(column => column.Text));
        Assert.Equal([null, 0, 2, 3], design.Columns.Skip(2).Select(column => column.CategoryIndex));
        Assert.Equal(7, design.Rows);
    }

    [Fact]
    public void Without_intercept_a_categorical_term_keeps_its_reference() => Assert.Equal(
        ["g [a]", "g [c]", "g [d]"],
        Design.Create(Table, SampleTable.Model("g") with { Intercept = false }, [0, 1, 2, 3, 4, 5, 6]).Columns.Select(column => column.Text));

    [Fact]
    public void Categories_without_rows_have_no_column_and_are_told()
    {
        var design = Design.Create(Table, SampleTable.Model("g"), [0, 1, 2, 3, 6]);
        Assert.Equal(["intercept", "g [a]", "g [d]"], design.Columns.Select(column => column.Text));
        var coding = Assert.Single(design.Codings);
        Assert.Equal(("b", false), (coding.Reference, coding.ReferenceReplaced));
        Assert.Equal(["c"], coding.LeftOut);
    }

    [Fact]
    public void A_reference_without_rows_is_replaced_and_that_is_told()
    {
        var design = Design.Create(Table, SampleTable.Model("g"), [0, 1, 4, 5, 6]);
        Assert.Equal(["intercept", "g [c]", "g [d]"], design.Columns.Select(column => column.Text));
        var coding = Assert.Single(design.Codings);
        Assert.Equal(("a", 0, true), (coding.Reference, coding.ReferenceIndex, coding.ReferenceReplaced));
        Assert.Equal(["b"], coding.LeftOut);
    }

    [Fact]
    public void Powers_are_formed_from_the_decimals_as_written()
    {
        var table = new DataTable([SampleTable.Number("y", 1, 3, 2, 5), FixtureTable.Numbers("x", ["0.1", "-6.860120914", "2.7", "1234.5678"])]);
        var design = Design.Create(table, SampleTable.Model("x^7"), [0, 1, 2, 3]);
        var block = new DesignBlock(4, 3);
        design.Fill(0, 4, block);
        string[] written = ["0.1", "-6.860120914", "2.7", "1234.5678"];
        for (var row = 0; row < 4; row++)
        {
            var exact = Enumerable.Repeat(Fraction.Parse(written[row]), 7).Aggregate((a, b) => a * b);
            var number = DoubleDouble.ScaleB(DoubleDouble.FromSum(block.Hi(1)[row], block.Lo(1)[row]), design.Exponent(1));
            var error = ((Fraction.Of(number.Hi) + Fraction.Of(number.Lo) - exact) / exact).ToDouble();
            Assert.True(Math.Abs(error) < 1e-30, $"{written[row]}: {error}");
        }
    }

    [Fact]
    public void Equal_terms_and_rows_out_of_order_are_errors_of_the_caller()
    {
        Assert.Throws<ArgumentException>(() => Design.Create(Table, SampleTable.Model("x", "x"), [0, 1, 2, 3]));
        Assert.Throws<ArgumentException>(() => Design.Create(Table, SampleTable.Model("x"), [0, 2, 1, 3]));
        Assert.Throws<ArgumentException>(() => Design.Create(Table, SampleTable.Model("x"), [0, 1, 2, 7]));
        Assert.Throws<ArgumentException>(() => Design.Create(Table, SampleTable.Model("x"), [-1, 1, 2, 3]));
    }

    [Fact]
    public void An_unknown_variable_is_refused_by_name() =>
        Refused(ModelRefusal.UnknownVariable, "age", SampleTable.Model("x", "age"), [0, 1, 2, 3], "'age'", "flat");

    [Fact]
    public void A_categorical_outcome_is_refused() =>
        Refused(ModelRefusal.OutcomeNotNumeric, "g", SampleTable.Model("x") with { Outcome = "g" }, [0, 1, 2, 3], "'g'", "choose another");

    [Fact]
    public void An_outcome_with_one_value_is_refused() =>
        Refused(ModelRefusal.OutcomeConstant, "flat", SampleTable.Model("x") with { Outcome = "flat" }, [0, 1, 2, 3], "'flat'", "4 analysed rows");

    [Fact]
    public void The_outcome_is_no_predictor_of_itself() =>
        Refused(ModelRefusal.OutcomeAmongTerms, "y", SampleTable.Model("x", "y^2"), [0, 1, 2, 3], "'y^2'", "Take that term out");

    [Fact]
    public void A_predictor_with_one_value_in_the_analysed_rows_is_refused()
    {
        Refused(ModelRefusal.PredictorConstant, "flat", SampleTable.Model("x", "flat"), [0, 1, 2, 3], "'flat'", "value 2");
        Assert.Equal(3, Design.Create(Table, SampleTable.Model("x", "flat"), [0, 1, 2, 6]).Columns.Count);
    }

    [Fact]
    public void A_categorical_predictor_with_one_category_left_is_refused() =>
        Refused(ModelRefusal.PredictorConstant, "holes", SampleTable.Model("holes"), [1, 3, 4], "'holes'", "category 'b'");

    [Fact]
    public void Values_that_differ_only_behind_the_sixteenth_digit_are_not_one_value()
    {
        var table = new DataTable([SampleTable.Number("y", 1, 3, 2, 5), FixtureTable.Numbers("x", ["1", "1.00000000000000000001", "1", "1"])]);
        Assert.Equal(2, Design.Create(table, SampleTable.Model("x"), [0, 1, 2, 3]).Columns.Count);
    }

    [Fact]
    public void A_power_of_a_category_is_refused() =>
        Refused(ModelRefusal.TermNotNumeric, "g", SampleTable.Model("g^2"), [0, 1, 2, 3], "'g^2'", "categorical");

    [Fact]
    public void A_missing_or_infinite_value_is_refused_with_its_row()
    {
        Refused(ModelRefusal.ValueMissing, "hole", SampleTable.Model("hole"), [0, 1, 2, 3], "missing in row 2", "'hole'");
        Refused(ModelRefusal.ValueMissing, "hole", SampleTable.Model("hole"), [0, 2, 3, 4], "infinite in row 5", "'hole'");
        Refused(ModelRefusal.ValueMissing, "holes", SampleTable.Model("holes"), [0, 1, 2, 3], "missing in row 3", "'holes'");
    }

    [Fact]
    public void No_more_rows_than_coefficients_are_refused()
    {
        Refused(ModelRefusal.TooFewRows, null, SampleTable.Model("x", "x^2"), [0, 1, 2], "3 or more coefficients on 3 analysed rows");
        Refused(ModelRefusal.TooFewRows, null, SampleTable.Model("g"), [0, 2, 4, 6], "4 or more coefficients on 4 analysed rows");
        Refused(ModelRefusal.TooFewRows, null, SampleTable.Model(), [], "0 analysed rows");
    }

    [Fact]
    public void A_model_of_nothing_is_refused() =>
        Refused(ModelRefusal.NothingToFit, null, SampleTable.Model() with { Intercept = false }, [0, 1, 2], "neither an intercept nor a term");

    [Fact]
    public void Magnitudes_beyond_what_can_be_squared_are_refused()
    {
        var table = new DataTable([SampleTable.Number("y", 1, 3, 2, 5), SampleTable.Number("x", 1e100, 2e100, 4e100, 3e100)]);
        var refusal = Assert.Throws<ModelRefusedException>(() => Design.Create(table, SampleTable.Model("x", "x^2"), [0, 1, 2, 3]));
        Assert.Equal(ModelRefusal.ValueOutOfRange, refusal.Refusal);
        Assert.Contains("another unit", refusal.Message, StringComparison.Ordinal);
    }

    private static void Refused(ModelRefusal refusal, string? variable, ModelSpecification specification, int[] rows, params string[] said)
    {
        var exception = Assert.Throws<ModelRefusedException>(() => Design.Create(Table, specification, rows));
        Assert.Equal(refusal, exception.Refusal);
        Assert.Equal(variable is null ? [] : [variable], exception.Variables);
        Assert.All(said, part => Assert.Contains(part, exception.Message, StringComparison.Ordinal));
    }
}
