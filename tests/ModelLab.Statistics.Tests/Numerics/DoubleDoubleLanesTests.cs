using CsCheck;
using ModelLab.Statistics.Numerics;
using ModelLab.Statistics.Tests.LeastSquares;

namespace ModelLab.Statistics.Tests.Numerics;

/// <summary>Arithmetic on whole columns against the same done number by number.</summary>
public sealed class DoubleDoubleLanesTests
{
    private static readonly Gen<double[]> Columns = Gen.Double[-1.0, 1.0].Array[64];

    [Fact]
    public void A_dot_product_is_right_to_ninety_five_bits_of_its_parts() => Gen.Select(Columns, Columns).Sample(
        (a, b) =>
        {
            var low = a.Select(value => value * 1e-17).ToArray();
            var exact = LiteralLeastSquares.Sum(a.Zip(low, (x, y) => Fraction.Of(x) + Fraction.Of(y)).Zip(b, (x, y) => x * Fraction.Of(y)));
            var size = a.Zip(b, (x, y) => Math.Abs(x * y)).Max() * 64;
            var dot = DoubleDoubleLanes.Dot(a, low, b, new double[64]);
            return Math.Abs((Fraction.Of(dot.Hi) + Fraction.Of(dot.Lo) - exact).ToDouble()) <= Math.ScaleB(size, -95);
        },
        seed: "0N0XIzNsQ0O2", iter: 500, threads: 1);

    [Fact]
    public void Element_by_element_operations_agree_with_single_numbers() => Gen.Select(Columns, Columns, Gen.Double[-2.0, 2.0]).Sample(
        (source, target, factor) =>
        {
            var multiple = DoubleDouble.FromSum(factor, factor * 1e-17);
            var hi = target.ToArray();
            var lo = target.Select(value => value * 1e-17).ToArray();
            DoubleDoubleLanes.SubtractMultiple(multiple, source, new double[64], hi, lo);
            DoubleDoubleLanes.AddSquare(source, new double[64], hi, lo);
            DoubleDoubleLanes.Multiply(multiple, hi, lo);
            for (var i = 0; i < hi.Length; i++)
            {
                DoubleDouble s = source[i];
                var expected = multiple * (DoubleDouble.FromSum(target[i], target[i] * 1e-17) - (multiple * s) + (s * s));
                var error = DoubleDouble.FromSum(hi[i], lo[i]) - expected;
                if (Math.Abs(error.Hi) > Math.ScaleB(16.0, -102))
                {
                    return false;
                }
            }

            return true;
        },
        seed: "0N0XIzNsQ0O2", iter: 500, threads: 1);

    [Fact]
    public void Columns_of_unequal_or_broken_length_are_refused()
    {
        Assert.Throws<ArgumentException>(() => DoubleDoubleLanes.Dot(new double[8], new double[8], new double[16], new double[16]));
        Assert.Throws<ArgumentException>(() => DoubleDoubleLanes.Dot(new double[7], new double[7], new double[7], new double[7]));
        Assert.Equal(16, DoubleDoubleLanes.Padded(9));
    }
}
