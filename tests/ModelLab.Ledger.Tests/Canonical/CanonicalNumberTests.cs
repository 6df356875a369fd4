using System.Globalization;
using CsCheck;
using ModelLab.Ledger.Canonical;
using Xunit;

namespace ModelLab.Ledger.Tests.Canonical;

public class CanonicalNumberTests
{
    /// <summary>RFC 8785 appendix B, "Number Serialization Samples": bits of the double, and its JSON.</summary>
    [Theory]
    [InlineData("0000000000000000", "0")]
    [InlineData("8000000000000000", "0")]
    [InlineData("0000000000000001", "5e-324")]
    [InlineData("8000000000000001", "-5e-324")]
    [InlineData("7fefffffffffffff", "1.7976931348623157e+308")]
    [InlineData("ffefffffffffffff", "-1.7976931348623157e+308")]
    [InlineData("4340000000000000", "9007199254740992")]
    [InlineData("c340000000000000", "-9007199254740992")]
    [InlineData("4430000000000000", "295147905179352830000")]
    [InlineData("44b52d02c7e14af5", "9.999999999999997e+22")]
    [InlineData("44b52d02c7e14af6", "1e+23")]
    [InlineData("44b52d02c7e14af7", "1.0000000000000001e+23")]
    [InlineData("444b1ae4d6e2ef4e", "999999999999999700000")]
    [InlineData("444b1ae4d6e2ef4f", "999999999999999900000")]
    [InlineData("444b1ae4d6e2ef50", "1e+21")]
    [InlineData("3eb0c6f7a0b5ed8c", "9.999999999999997e-7")]
    [InlineData("3eb0c6f7a0b5ed8d", "0.000001")]
    [InlineData("41b3de4355555553", "333333333.3333332")]
    [InlineData("41b3de4355555554", "333333333.33333325")]
    [InlineData("41b3de4355555555", "333333333.3333333")]
    [InlineData("41b3de4355555556", "333333333.3333334")]
    [InlineData("41b3de4355555557", "333333333.33333343")]
    [InlineData("becbf647612f3696", "-0.0000033333333333333333")]
    [InlineData("43143ff3c1cb0959", "1424953923781206.2")]
    public void Samples_of_the_standard(string bits, string text) =>
        Assert.Equal(text, CanonicalNumber.Text(OfBits(bits)));

    /// <summary>RFC 8785 appendix B: NaN and infinity are errors.</summary>
    [Theory]
    [InlineData("7fffffffffffffff")]
    [InlineData("7ff0000000000000")]
    [InlineData("fff0000000000000")]
    public void What_is_no_finite_number_is_refused(string bits) =>
        Assert.Throws<ArgumentException>(() => CanonicalNumber.Text(OfBits(bits)));

    /// <summary>Against JSON.stringify of Node.js 20 (ECMA-262); how the file was made stands in ecmascript-numbers.mjs.</summary>
    [Fact]
    public void Texts_are_those_of_an_ECMAScript_engine()
    {
        var lines = File.ReadAllLines(Path.Combine(AppContext.BaseDirectory, "Fixtures", "ecmascript-numbers.csv"));
        Assert.True(lines.Length > 4000);
        var wrong = lines.Select(l => l.Split(',')).Where(l => CanonicalNumber.Text(OfBits(l[0])) != l[1]).Select(l => l[0]);
        Assert.Empty(wrong);
    }

    [Fact]
    public void Every_text_reads_back_as_the_same_double_and_fits_the_room_stated()
    {
        FixedSamples.Check(Gen.Double, 50_000, value =>
        {
            if (double.IsFinite(value))
            {
                var text = CanonicalNumber.Text(value);
                Assert.Equal(value, double.Parse(text, CultureInfo.InvariantCulture));
                Assert.InRange(text.Length, 1, 25);
            }
        });
    }

    [Fact]
    public void Too_small_a_destination_is_refused() =>
        Assert.Throws<ArgumentException>(() => CanonicalNumber.Write(1, new byte[CanonicalNumber.MaximumLength - 1]));

    private static double OfBits(string hex) => BitConverter.Int64BitsToDouble(Convert.ToInt64(hex, 16));
}
