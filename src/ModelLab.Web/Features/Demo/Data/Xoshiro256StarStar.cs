using System.Numerics;

namespace ModelLab.Web.Features.Demo.Data;

/// <summary>
/// The generator xoshiro256** of Blackman and Vigna ("Scrambled linear pseudorandom number generators", ACM Transactions on
/// Mathematical Software 47, 2021), its state filled by SplitMix64 (Steele, Lea and Flood 2014). The same numbers on every machine.
/// </summary>
public sealed class Xoshiro256StarStar
{
    private ulong s0;
    private ulong s1;
    private ulong s2;
    private ulong s3;

    /// <summary>Fills the state with the first four outputs of SplitMix64.</summary>
    /// <param name="seed">Any number.</param>
    public Xoshiro256StarStar(ulong seed)
        : this(SplitMix64(ref seed), SplitMix64(ref seed), SplitMix64(ref seed), SplitMix64(ref seed))
    {
    }

    /// <summary>Starts from a given state.</summary>
    /// <exception cref="ArgumentException">All four words are zero: the generator would give nothing but zeros.</exception>
    public Xoshiro256StarStar(ulong first, ulong second, ulong third, ulong fourth)
    {
        if ((first | second | third | fourth) == 0)
        {
            throw new ArgumentException("At least one word of the state has to differ from zero.");
        }

        (s0, s1, s2, s3) = (first, second, third, fourth);
    }

    /// <summary>The next 64 bits.</summary>
    public ulong Next()
    {
        var result = BitOperations.RotateLeft(s1 * 5, 7) * 9;
        var shifted = s1 << 17;
        s2 ^= s0;
        s3 ^= s1;
        s1 ^= s2;
        s0 ^= s3;
        s2 ^= shifted;
        s3 = BitOperations.RotateLeft(s3, 45);
        return result;
    }

    /// <summary>A number from 0 to below 1: the upper 53 bits over 2⁵³.</summary>
    public double NextUnit() => (Next() >> 11) * (1.0 / (1UL << 53));

    /// <summary>The next output of SplitMix64, and its state moved on.</summary>
    public static ulong SplitMix64(ref ulong state)
    {
        state += 0x9E3779B97F4A7C15;
        var z = state;
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EB;
        return z ^ (z >> 31);
    }
}
