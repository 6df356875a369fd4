using System.Globalization;
using System.Numerics;
using CsCheck;
using ModelLab.Statistics.Numerics;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Numerics;

/// <summary>Every reading is compared with exact fractions of whole numbers, and the value also with the runtime's own parser.</summary>
public sealed class DecimalReaderTests
{
    private const string Seed = "0N0XIzNsQ0O2";

    private static readonly Gen<string> Decimals =
        from digits in Gen.Char['0', '9'].Array[1, 40]
        from mark in Gen.Int[0, 40]
        from exponent in Gen.OneOf(Gen.Const(0), Gen.Int[-30, 30], Gen.Int[-330, 310])
        from negative in Gen.Bool
        select Write(new string(digits), mark, exponent, negative);

    [Theory]
    [InlineData("0", 0.0)]
    [InlineData("-0.000", 0.0)]
    [InlineData("17", 17.0)]
    [InlineData("+1.5", 1.5)]
    [InlineData(".5", 0.5)]
    [InlineData("760.", 760.0)]
    [InlineData("-3e2", -300.0)]
    [InlineData("1.25E-2", 0.0125)]
    [InlineData("100000000000000000000000", 1e23)]
    [InlineData("9007199254740993", 9007199254740992.0)]
    [InlineData("1e-400", 0.0)]
    [InlineData("0e999999999999", 0.0)]
    public void Reads_what_is_a_number(string text, double expected)
    {
        Assert.True(DecimalReader.TryRead(text, '.', out var value, out _));
        Assert.Equal(expected, value);
    }

    [Theory]
    [InlineData("")]
    [InlineData(" 1")]
    [InlineData("1 ")]
    [InlineData(".")]
    [InlineData("-")]
    [InlineData("-.")]
    [InlineData("1.2.3")]
    [InlineData("1,5")]
    [InlineData("1e")]
    [InlineData("1e+")]
    [InlineData("e5")]
    [InlineData("1e5.0")]
    [InlineData("1e5 ")]
    [InlineData("0x10")]
    [InlineData("NaN")]
    [InlineData("Infinity")]
    [InlineData("1e400")]
    [InlineData("-1.8e308")]
    [InlineData("--1")]
    [InlineData("1-2")]
    [InlineData("١")]
    public void Refuses_what_is_none(string text)
    {
        Assert.False(DecimalReader.TryRead(text, '.', out var value, out var remainder));
        Assert.Equal(0.0, value);
        Assert.Equal(0.0, remainder);
    }

    [Fact]
    public void Refuses_a_text_longer_than_any_number() =>
        Assert.False(DecimalReader.TryRead(new string('1', DecimalReader.MaximumLength + 1), '.', out _, out _));

    [Fact]
    public void A_comma_is_a_mark_where_it_is_asked_for()
    {
        Assert.True(DecimalReader.TryRead("1,5", ',', out var value, out _));
        Assert.Equal(1.5, value);
        Assert.False(DecimalReader.TryRead("1.5", ',', out _, out _));
    }

    [Fact]
    public void The_remainder_of_a_tenth_is_known()
    {
        // The double nearest to 0.1 is 3602879701896397/2^55, larger than 0.1 by 1/(5·2^54) + ... = 5.551115123125783e-18 (IEEE 754 arithmetic).
        Assert.True(DecimalReader.TryRead("0.1", '.', out var value, out var remainder));
        Assert.Equal(0.1, value);
        Assert.Equal(-5.551115123125783e-18, remainder);
    }

    [Theory]
    [InlineData("9007199254740993")] // halfway between two doubles: goes to the even one
    [InlineData("9007199254740995")]
    [InlineData("900719925474099.3")]
    [InlineData("0.5000000000000000555")] // just below halfway
    [InlineData("0.50000000000000005551115123125782702118158340454101562")] // just below halfway
    [InlineData("0.500000000000000055511151231257827021181583404541015625")] // halfway
    [InlineData("0.5000000000000000555111512312578270211815834045410156251")] // just above
    [InlineData("18446744073709551615")]
    [InlineData("1844674407370955161.5")]
    [InlineData("9999999999999999999")]
    [InlineData("0.9999999999999999999")]
    [InlineData("1.7976931348623157e308")]
    [InlineData("2.2250738585072011e-308")]
    [InlineData("4.9406564584124654e-324")]
    [InlineData("123456789012345678901234567890.1234567890")]
    public void Hard_cases_are_exact(string text) => Check(text);

    [Fact]
    public void Any_decimal_of_up_to_forty_digits_is_exact() => Decimals.Sample(Check, seed: Seed, iter: 20_000, threads: 1);

    [Fact]
    public void Doubles_written_with_seventeen_digits_come_back() =>
        Gen.Double.Where(double.IsFinite).Select(value => value.ToString("R", CultureInfo.InvariantCulture)).Sample(Check, seed: Seed, iter: 20_000, threads: 1);

    [Fact]
    public void Short_decimals_as_in_tables_are_exact() =>
        Gen.Select(Gen.Long[-99_999_999_999, 99_999_999_999], Gen.Int[0, 12])
            .Select((whole, places) => Write(Math.Abs(whole).ToString(CultureInfo.InvariantCulture), places, 0, whole < 0))
            .Sample(Check, seed: Seed, iter: 20_000, threads: 1);

    private static string Write(string digits, int places, int exponent, bool negative)
    {
        var text = places == 0 ? digits : digits.PadLeft(places + 1, '0').Insert(Math.Max(digits.Length, places + 1) - places, ".");
        return (negative ? "-" : "") + text + (exponent == 0 ? "" : string.Create(CultureInfo.InvariantCulture, $"e{exponent}"));
    }

    private static void Check(string text)
    {
        var runtime = double.Parse(text, CultureInfo.InvariantCulture);
        var read = DecimalReader.TryRead(text, '.', out var value, out var remainder);
        Assert.Equal(double.IsFinite(runtime), read);
        if (!read)
        {
            return;
        }

        Assert.True(value == runtime, text);
        var error = (Fraction.Parse(text) - Fraction.Of(value) - Fraction.Of(remainder)).Abs();
        var whole = Fraction.Parse(text).Abs();

        // 106 bits of the number, or the smallest double where the remainder itself underflows.
        var bound = (whole / new Fraction(BigInteger.Pow(2, 105), 1)) + new Fraction(1, BigInteger.Pow(2, 1074));
        Assert.True(error.CompareTo(bound) <= 0, $"{text}: value {value:R}, remainder {remainder:R}");
        Assert.True(Math.Abs(remainder) <= (Math.BitIncrement(Math.Abs(value)) - Math.Abs(value)) / 2.0, text);
    }
}
