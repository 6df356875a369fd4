using System.Buffers.Binary;

namespace ModelLab.Intake.Csv.Profiling;

/// <summary>
/// A 64-bit hash of a text by multiply and fold, the same on every machine. Two among ten thousand texts share one by chance with
/// probability below 3e-12; it only serves to count distinct values without keeping them.
/// </summary>
internal static class TextHash
{
    // odd constants with well-mixed bits: the fractional parts of the square roots of 2, 3 and 5
    private const ulong First = 0x6A09E667F3BCC909;
    private const ulong Second = 0xBB67AE8584CAA73B;
    private const ulong Third = 0x3C6EF372FE94F82B;

    /// <summary>The hash of bytes.</summary>
    internal static ulong Of(ReadOnlySpan<byte> bytes)
    {
        var hash = Third ^ (ulong)bytes.Length;
        while (bytes.Length >= 8)
        {
            hash = Fold(hash ^ BinaryPrimitives.ReadUInt64LittleEndian(bytes), First);
            bytes = bytes[8..];
        }

        ulong rest = 0;
        for (var i = 0; i < bytes.Length; i++)
        {
            rest |= (ulong)bytes[i] << (8 * i);
        }

        return Fold(Fold(hash ^ rest, First) ^ Second, Third);
    }

    private static ulong Fold(ulong a, ulong b)
    {
        var high = Math.BigMul(a, b, out var low);
        return high ^ low;
    }
}
