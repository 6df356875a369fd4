using System.Globalization;
using System.Runtime.CompilerServices;

namespace ModelLab.Statistics.Numerics;

/// <summary>
/// A number held as the unevaluated sum of two doubles, about 32 decimal digits.
/// </summary>
/// <remarks>
/// Invariant: <see cref="Hi"/> is the double nearest to the sum. The error-free sums and products are those of Dekker (1971) and
/// Knuth (The Art of Computer Programming, vol. 2); the arithmetic follows Joldes, Muller and Popescu (2017), "Tight and rigorous
/// error bounds for basic building blocks of double-word arithmetic". Relative errors stay below 2⁻¹⁰² for every operation.
/// The range is that of double; near underflow (below about 1e−290) the low part is lost. Fused multiply-add is called by name,
/// so that every machine gives the same bits.
/// </remarks>
public readonly struct DoubleDouble : IEquatable<DoubleDouble>, IComparable<DoubleDouble>
{
    private DoubleDouble(double hi, double lo)
    {
        Hi = hi;
        Lo = lo;
    }

    /// <summary>Zero.</summary>
    public static DoubleDouble Zero => default;

    /// <summary>One.</summary>
    public static DoubleDouble One => new(1.0, 0.0);

    /// <summary>The nearest double.</summary>
    public double Hi { get; }

    /// <summary>What is left of the number beside <see cref="Hi"/>.</summary>
    public double Lo { get; }

    /// <summary>Whether the number is zero.</summary>
    public bool IsZero => Hi == 0.0;

    /// <summary>A double, exactly.</summary>
    public static implicit operator DoubleDouble(double value) => new(value, 0.0);

    /// <summary>The nearest double.</summary>
    public static explicit operator double(DoubleDouble value) => value.Hi;

    /// <summary>a + b.</summary>
    public static DoubleDouble operator +(DoubleDouble a, DoubleDouble b)
    {
        var high = FromSum(a.Hi, b.Hi);
        var low = FromSum(a.Lo, b.Lo);
        var middle = FromOrderedSum(high.Hi, high.Lo + low.Hi);
        return FromOrderedSum(middle.Hi, low.Lo + middle.Lo);
    }

    /// <summary>a − b.</summary>
    public static DoubleDouble operator -(DoubleDouble a, DoubleDouble b) => a + -b;

    /// <summary>−a.</summary>
    public static DoubleDouble operator -(DoubleDouble a) => new(-a.Hi, -a.Lo);

    /// <summary>a · b.</summary>
    public static DoubleDouble operator *(DoubleDouble a, DoubleDouble b)
    {
        var product = a.Hi * b.Hi;
        var error = Math.FusedMultiplyAdd(a.Hi, b.Hi, -product);
        var cross = Math.FusedMultiplyAdd(a.Hi, b.Lo, Math.FusedMultiplyAdd(a.Lo, b.Hi, a.Lo * b.Lo));
        return FromOrderedSum(product, error + cross);
    }

    /// <summary>a / b; infinite or not a number where b is zero.</summary>
    public static DoubleDouble operator /(DoubleDouble a, DoubleDouble b)
    {
        var first = a.Hi / b.Hi;
        if (!double.IsFinite(first))
        {
            return new DoubleDouble(first, 0.0);
        }

        var rest = a - (b * first);
        var second = rest.Hi / b.Hi;
        rest -= b * second;
        var third = rest.Hi / b.Hi;
        var quotient = FromOrderedSum(first, second);
        return FromOrderedSum(quotient.Hi, quotient.Lo + third);
    }

    /// <summary>Whether both are the same number.</summary>
    public static bool operator ==(DoubleDouble a, DoubleDouble b) => a.Equals(b);

    /// <summary>Whether the numbers differ.</summary>
    public static bool operator !=(DoubleDouble a, DoubleDouble b) => !a.Equals(b);

    /// <summary>Whether a lies below b.</summary>
    public static bool operator <(DoubleDouble a, DoubleDouble b) => a.Hi < b.Hi || (a.Hi == b.Hi && a.Lo < b.Lo);

    /// <summary>Whether a lies above b.</summary>
    public static bool operator >(DoubleDouble a, DoubleDouble b) => b < a;

    /// <summary>Whether a lies not above b.</summary>
    public static bool operator <=(DoubleDouble a, DoubleDouble b) => a.Hi < b.Hi || (a.Hi == b.Hi && a.Lo <= b.Lo);

    /// <summary>Whether a lies not below b.</summary>
    public static bool operator >=(DoubleDouble a, DoubleDouble b) => b <= a;

    /// <summary>a + b of two doubles, without error.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static DoubleDouble FromSum(double a, double b)
    {
        var sum = a + b;
        var part = sum - a;
        return new DoubleDouble(sum, (a - (sum - part)) + (b - part));
    }

    /// <summary>a · b of two doubles, without error.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static DoubleDouble FromProduct(double a, double b)
    {
        var product = a * b;
        return new DoubleDouble(product, Math.FusedMultiplyAdd(a, b, -product));
    }

    /// <summary>√a; not a number where a is negative.</summary>
    public static DoubleDouble Sqrt(DoubleDouble a)
    {
        if (a.Hi <= 0.0 || !double.IsFinite(a.Hi))
        {
            return new DoubleDouble(Math.Sqrt(a.Hi), 0.0);
        }

        // Two Newton corrections: the first takes the double root to about 32 digits, the second takes out what it left.
        var root = Math.Sqrt(a.Hi);
        var corrected = FromOrderedSum(root, (a - FromProduct(root, root)).Hi / (2.0 * root));
        return corrected + ((a - (corrected * corrected)).Hi / (2.0 * root));
    }

    /// <summary>|a|.</summary>
    public static DoubleDouble Abs(DoubleDouble a) => a.Hi < 0.0 ? -a : a;

    /// <summary>a · 2^<paramref name="exponent"/>, exact within the range of double.</summary>
    public static DoubleDouble ScaleB(DoubleDouble a, int exponent) =>
        new(Math.ScaleB(a.Hi, exponent), Math.ScaleB(a.Lo, exponent));

    /// <summary>a to a whole power of 0 or more.</summary>
    public static DoubleDouble Pow(DoubleDouble a, int exponent)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(exponent);
        var result = One;
        for (var square = a; exponent > 0; exponent >>= 1, square *= square)
        {
            if ((exponent & 1) != 0)
            {
                result *= square;
            }
        }

        return result;
    }

    /// <summary>Natural logarithm to double accuracy, the low part taken into account.</summary>
    public static double Log(DoubleDouble a) => Math.Log(a.Hi) + (a.Lo / a.Hi);

    /// <inheritdoc/>
    public int CompareTo(DoubleDouble other)
    {
        var high = Hi.CompareTo(other.Hi);
        return high != 0 ? high : Lo.CompareTo(other.Lo);
    }

    /// <inheritdoc/>
    public bool Equals(DoubleDouble other) => Hi.Equals(other.Hi) && Lo.Equals(other.Lo);

    /// <inheritdoc/>
    public override bool Equals(object? obj) => obj is DoubleDouble other && Equals(other);

    /// <inheritdoc/>
    public override int GetHashCode() => HashCode.Combine(Hi, Lo);

    /// <summary>The two parts, for reading in a debugger.</summary>
    public override string ToString() => string.Create(CultureInfo.InvariantCulture, $"{Hi:R} + {Lo:R}");

    /// <summary>a + b where |a| ≥ |b| or a = 0, without error.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    internal static DoubleDouble FromOrderedSum(double a, double b)
    {
        var sum = a + b;
        return new DoubleDouble(sum, b - (sum - a));
    }
}
