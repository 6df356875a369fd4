using System.Globalization;
using CsCheck;
using ModelLab.Intake.Csv.Reading;

namespace ModelLab.Intake.Tests.Csv.Reading;

public sealed class CellShapeTests
{
    [Theory]
    [InlineData("1", NumberForm.Plain)]
    [InlineData("-1e5", NumberForm.Plain)]
    [InlineData("1.5", NumberForm.Point)]
    [InlineData(".5", NumberForm.Point)]
    [InlineData("5.", NumberForm.Point)]
    [InlineData("1,5", NumberForm.Comma)]
    [InlineData("1,234,567", NumberForm.Grouped)]
    [InlineData("1.234,5", NumberForm.Grouped)]
    [InlineData("12 345 678", NumberForm.Grouped)]
    [InlineData("-1'234", NumberForm.Grouped)]
    [InlineData("1 23", NumberForm.None)]
    [InlineData("1234 567", NumberForm.None)]
    [InlineData("020 123 456", NumberForm.None)]
    [InlineData("1.5.6", NumberForm.None)]
    [InlineData("1e", NumberForm.None)]
    [InlineData("e5", NumberForm.None)]
    [InlineData(",", NumberForm.None)]
    [InlineData("-", NumberForm.None)]
    [InlineData("1-2", NumberForm.None)]
    public void Forms_are_told_apart(string text, object form) => Assert.Equal(form, CellShape.Of(Fixture.Utf8(text)).Form);

    [Theory]
    [InlineData("1.0", true)]
    [InlineData("1.50", false)]
    [InlineData("1.5e1", true)]
    [InlineData("12345678901234567890.5", false)]
    [InlineData("12345678901234567890", true)]
    [InlineData("1e-1", false)]
    public void Whole_numbers_are_known(string text, bool whole) => Assert.Equal(whole, CellShape.Of(Fixture.Utf8(text)).Whole);

    [Fact]
    public void Values_are_the_nearest_doubles() =>
        FixedDraws.Each(
            Gen.Select(Gen.Long, Gen.Int[0, 18], Gen.Int[-30, 30]),
            60,
            20_000,
            draw =>
            {
                var (digits, places, exponent) = draw;
                var whole = digits.ToString(CultureInfo.InvariantCulture);
                var cut = Math.Max(whole.StartsWith('-') ? 2 : 1, whole.Length - places);
                var text = whole[..cut] + (cut < whole.Length ? "." + whole[cut..] : string.Empty) + (exponent == 0 ? string.Empty : string.Create(CultureInfo.InvariantCulture, $"e{exponent}"));

                Assert.Equal(double.Parse(text, CultureInfo.InvariantCulture), CellShape.Of(Fixture.Utf8(text)).Value);
            });

    [Fact]
    public void What_looks_like_a_number_is_read_as_one_and_nothing_else_is() =>
        FixedDraws.Each(
            Gen.Select(Gen.String[Gen.Char["019.,eE+- x"], 1, 9], Gen.OneOf('.', ',')),
            61,
            100_000,
            draw =>
            {
                var (text, mark) = draw;
                var shape = CellShape.Of(Fixture.Utf8(text));
                var isNumber = shape.Form == NumberForm.Plain || shape.Form == (mark == '.' ? NumberForm.Point : NumberForm.Comma);

                Assert.Equal(isNumber, NumberCell.TryRead(Fixture.Utf8(text), mark, out var value, out _));
                Assert.Equal(isNumber ? shape.Value : 0, value);
            });
}
