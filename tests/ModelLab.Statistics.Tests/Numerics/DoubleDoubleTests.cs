using System.Numerics;
using CsCheck;
using ModelLab.Statistics.Numerics;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Numerics;

/// <summary>Double-double arithmetic against exact fractions of whole numbers.</summary>
public sealed class DoubleDoubleTests
{
    private const string Seed = "0N0XIzNsQ0O2";

    private static readonly Gen<DoubleDouble> Numbers =
        from high in Gen.Double[-1.0, 1.0]
        from low in Gen.Double[-1.0, 1.0]
        from power in Gen.Int[-60, 60]
        from gap in Gen.Int[53, 70]
        select DoubleDouble.FromSum(Math.ScaleB(high, power), Math.ScaleB(high * low, power - gap));

    [Fact]
    public void A_sum_is_right_to_a_hundred_bits() => Pairs((a, b) => Close(a + b, Exact(a) + Exact(b)));

    [Fact]
    public void A_difference_of_neighbours_is_right_to_a_hundred_bits() => Pairs((a, b) =>
    {
        var near = a + (b * Math.ScaleB(1.0, -90));
        return Close(a - near, Exact(a) - Exact(near));
    });

    [Fact]
    public void A_product_is_right_to_a_hundred_bits() => Pairs((a, b) => Close(a * b, Exact(a) * Exact(b)));

    [Fact]
    public void A_quotient_is_right_to_a_hundred_bits() => Pairs((a, b) => b.IsZero || Close(a / b, Exact(a) / Exact(b)));

    [Fact]
    public void A_root_squared_is_right_to_a_hundred_bits() => Pairs((a, _) =>
    {
        var root = DoubleDouble.Sqrt(DoubleDouble.Abs(a));
        return a.IsZero || Within(Exact(root) * Exact(root) - Exact(a).Abs(), Exact(a), 100);
    });

    [Fact]
    public void A_power_is_right_to_ninety_five_bits() => Pairs((a, _) =>
    {
        var exact = Enumerable.Repeat(Exact(a), 5).Aggregate((x, y) => x * y);
        return Math.Abs(a.Hi) < 1e-50 || Within(Exact(DoubleDouble.Pow(a, 5)) - exact, exact, 95); // below, the low part underflows
    });

    [Fact]
    public void Order_follows_the_exact_numbers() => Pairs((a, b) =>
        Math.Sign(a.CompareTo(b)) == Exact(a).CompareTo(Exact(b)) && a < b == Exact(a).CompareTo(Exact(b)) < 0 && a >= b == !(a < b) && a <= b == !(a > b));

    [Fact]
    public void Errors_of_two_doubles_are_kept_whole() => Gen.Select(Gen.Double[-1e10, 1e10], Gen.Double[-1e-10, 1e-10]).Sample(
        (a, b) => Exact(DoubleDouble.FromSum(a, b)) == Fraction.Of(a) + Fraction.Of(b)
            && Exact(DoubleDouble.FromProduct(a, b)) == Fraction.Of(a) * Fraction.Of(b),
        seed: Seed, iter: 2_000, threads: 1);

    [Fact]
    public void Ends_of_the_range_behave_as_doubles_do()
    {
        Assert.True(double.IsInfinity((DoubleDouble.One / DoubleDouble.Zero).Hi));
        Assert.True(double.IsNaN(DoubleDouble.Sqrt(-1.0).Hi));
        Assert.True(DoubleDouble.Sqrt(0.0).IsZero);
        Assert.Equal(DoubleDouble.One, DoubleDouble.Pow(3.0, 0));
        Assert.Equal(0.0, DoubleDouble.Log(1.0));
    }

    [Fact]
    public void The_logarithm_of_one_and_a_trifle_is_the_trifle() =>
        Assert.Equal(1e-20, DoubleDouble.Log(DoubleDouble.One + 1e-20), 1e-35);

    private static void Pairs(Func<DoubleDouble, DoubleDouble, bool> holds) =>
        Gen.Select(Numbers, Numbers).Sample((a, b) => holds(a, b), seed: Seed, iter: 2_000, threads: 1);

    private static Fraction Exact(DoubleDouble number) => Fraction.Of(number.Hi) + Fraction.Of(number.Lo);

    private static bool Close(DoubleDouble number, Fraction exact) =>
        number.Hi == number.Hi + number.Lo && Within(Exact(number) - exact, exact, 102);

    private static bool Within(Fraction error, Fraction exact, int bits) =>
        error.Abs().CompareTo(exact.Abs() / new Fraction(BigInteger.Pow(2, bits), 1)) <= 0;
}
