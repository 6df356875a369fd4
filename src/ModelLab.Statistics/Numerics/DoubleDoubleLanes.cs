using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace ModelLab.Statistics.Numerics;

/// <summary>
/// Double-double arithmetic over whole columns, eight rows at a time.
/// </summary>
/// <remarks>
/// A column is two arrays (high and low parts) whose length is a multiple of <see cref="Width"/>. The eight lanes are fixed: a
/// processor with narrower vectors does the same operations in several steps, so the bits do not depend on it. A sum runs down
/// each lane in the order of the rows, and the lanes are put together in one fixed order.
/// </remarks>
internal static class DoubleDoubleLanes
{
    /// <summary>Number of lanes.</summary>
    public const int Width = 8;

    /// <summary>The smallest multiple of <see cref="Width"/> not below <paramref name="rows"/>.</summary>
    public static int Padded(int rows) => (rows + Width - 1) / Width * Width;

    /// <summary>Σ aᵢbᵢ, as accurate as if computed in double-double (compensated, Ogita, Rump and Oishi 2005, "Accurate sum and dot product").</summary>
    public static DoubleDouble Dot(ReadOnlySpan<double> aHi, ReadOnlySpan<double> aLo, ReadOnlySpan<double> bHi, ReadOnlySpan<double> bLo)
    {
        var length = CommonLength(aHi, aLo, bHi, bLo);
        ref var ah = ref MemoryMarshal.GetReference(aHi);
        ref var al = ref MemoryMarshal.GetReference(aLo);
        ref var bh = ref MemoryMarshal.GetReference(bHi);
        ref var bl = ref MemoryMarshal.GetReference(bLo);
        var high = Vector512<double>.Zero;
        var low = Vector512<double>.Zero;
        for (nuint i = 0; i < length; i += Width)
        {
            var x = Vector512.LoadUnsafe(ref ah, i);
            var y = Vector512.LoadUnsafe(ref bh, i);
            var product = x * y;
            var error = Vector512.FusedMultiplyAdd(x, y, -product);
            error = Vector512.FusedMultiplyAdd(x, Vector512.LoadUnsafe(ref bl, i), error);
            error = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref al, i), y, error);
            var sum = high + product;
            var part = sum - high;
            low += (high - (sum - part)) + (product - part) + error;
            high = sum;
        }

        return Gather(high, low);
    }

    /// <summary>target ← target − factor · source, element by element.</summary>
    public static void SubtractMultiple(DoubleDouble factor, ReadOnlySpan<double> sourceHi, ReadOnlySpan<double> sourceLo, Span<double> targetHi, Span<double> targetLo)
    {
        var length = CommonLength(sourceHi, sourceLo, targetHi, targetLo);
        ref var sh = ref MemoryMarshal.GetReference(sourceHi);
        ref var sl = ref MemoryMarshal.GetReference(sourceLo);
        ref var th = ref MemoryMarshal.GetReference(targetHi);
        ref var tl = ref MemoryMarshal.GetReference(targetLo);
        var fh = Vector512.Create(-factor.Hi);
        var fl = Vector512.Create(-factor.Lo);
        for (nuint i = 0; i < length; i += Width)
        {
            var x = Vector512.LoadUnsafe(ref sh, i);
            var product = fh * x;
            var error = Vector512.FusedMultiplyAdd(fh, x, -product);
            error = Vector512.FusedMultiplyAdd(fh, Vector512.LoadUnsafe(ref sl, i), error);
            error = Vector512.FusedMultiplyAdd(fl, x, error);
            var t = Vector512.LoadUnsafe(ref th, i);
            var sum = t + product;
            var part = sum - t;
            error += (t - (sum - part)) + (product - part) + Vector512.LoadUnsafe(ref tl, i);
            var high = sum + error;
            high.StoreUnsafe(ref th, i);
            (error - (high - sum)).StoreUnsafe(ref tl, i);
        }
    }

    /// <summary>target ← factor · target, element by element.</summary>
    public static void Multiply(DoubleDouble factor, Span<double> targetHi, Span<double> targetLo)
    {
        var length = CommonLength(targetHi, targetLo, targetHi, targetLo);
        ref var th = ref MemoryMarshal.GetReference(targetHi);
        ref var tl = ref MemoryMarshal.GetReference(targetLo);
        var fh = Vector512.Create(factor.Hi);
        var fl = Vector512.Create(factor.Lo);
        for (nuint i = 0; i < length; i += Width)
        {
            var x = Vector512.LoadUnsafe(ref th, i);
            var product = fh * x;
            var error = Vector512.FusedMultiplyAdd(fh, x, -product);
            error = Vector512.FusedMultiplyAdd(fh, Vector512.LoadUnsafe(ref tl, i), error);
            error = Vector512.FusedMultiplyAdd(fl, x, error);
            var high = product + error;
            high.StoreUnsafe(ref th, i);
            (error - (high - product)).StoreUnsafe(ref tl, i);
        }
    }

    /// <summary>target ← target + source², element by element.</summary>
    public static void AddSquare(ReadOnlySpan<double> sourceHi, ReadOnlySpan<double> sourceLo, Span<double> targetHi, Span<double> targetLo)
    {
        var length = CommonLength(sourceHi, sourceLo, targetHi, targetLo);
        ref var sh = ref MemoryMarshal.GetReference(sourceHi);
        ref var sl = ref MemoryMarshal.GetReference(sourceLo);
        ref var th = ref MemoryMarshal.GetReference(targetHi);
        ref var tl = ref MemoryMarshal.GetReference(targetLo);
        for (nuint i = 0; i < length; i += Width)
        {
            var x = Vector512.LoadUnsafe(ref sh, i);
            var y = Vector512.LoadUnsafe(ref sl, i);
            var product = x * x;
            var error = Vector512.FusedMultiplyAdd(x, x, -product);
            error = Vector512.FusedMultiplyAdd(x + x, y, error);
            var t = Vector512.LoadUnsafe(ref th, i);
            var sum = t + product;
            var part = sum - t;
            error += (t - (sum - part)) + (product - part) + Vector512.LoadUnsafe(ref tl, i);
            var high = sum + error;
            high.StoreUnsafe(ref th, i);
            (error - (high - sum)).StoreUnsafe(ref tl, i);
        }
    }

    // Lanes 0–3 meet 4–7, then 0–1 meet 2–3, then 0 meets 1.
    private static DoubleDouble Gather(Vector512<double> high, Vector512<double> low)
    {
        Span<DoubleDouble> lanes = stackalloc DoubleDouble[Width];
        for (var lane = 0; lane < Width; lane++)
        {
            lanes[lane] = DoubleDouble.FromSum(high.GetElement(lane), low.GetElement(lane));
        }

        for (var half = Width / 2; half > 0; half /= 2)
        {
            for (var lane = 0; lane < half; lane++)
            {
                lanes[lane] += lanes[lane + half];
            }
        }

        return lanes[0];
    }

    private static nuint CommonLength(ReadOnlySpan<double> a, ReadOnlySpan<double> b, ReadOnlySpan<double> c, ReadOnlySpan<double> d)
    {
        if (a.Length % Width != 0 || b.Length != a.Length || c.Length != a.Length || d.Length != a.Length)
        {
            throw new ArgumentException("Columns must have one length, a multiple of the number of lanes.");
        }

        return (nuint)a.Length;
    }
}
