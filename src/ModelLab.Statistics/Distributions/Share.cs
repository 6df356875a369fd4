using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Distributions;

/// <summary>
/// The shares of two positive amounts in their sum, with logarithms that hold where a share itself falls below the
/// smallest double.
/// </summary>
/// <param name="First">first/(first + second).</param>
/// <param name="Second">second/(first + second).</param>
/// <param name="LogFirst">ln First.</param>
/// <param name="LogSecond">ln Second.</param>
internal readonly record struct Share(DoubleDouble First, DoubleDouble Second, DoubleDouble LogFirst, DoubleDouble LogSecond)
{
    // Beyond 2^200 the smaller share is too small to change 1 − share in double-double.
    private const int Apart = 200;

    /// <summary>The same with the two exchanged.</summary>
    public Share Exchanged => new(Second, First, LogSecond, LogFirst);

    /// <summary>Shares of <paramref name="first"/> and <paramref name="second"/>·2^<paramref name="power"/>, both positive and finite.</summary>
    public static Share Of(DoubleDouble first, DoubleDouble second, int power)
    {
        var firstPower = Math.ILogB(first.Hi);
        var secondPower = Math.ILogB(second.Hi);
        var a = DoubleDouble.ScaleB(first, -firstPower);
        var b = DoubleDouble.ScaleB(second, -secondPower);
        var apart = power + secondPower - firstPower;
        if (apart > Apart)
        {
            var small = a / b;
            var share = DoubleDouble.ScaleB(small, -apart);
            return new Share(share, 1.0, Logarithm.Of(small) - (Exponential.Ln2 * (double)apart), -share);
        }

        if (apart < -Apart)
        {
            var small = b / a;
            var share = DoubleDouble.ScaleB(small, apart);
            return new Share(1.0, share, -share, Logarithm.Of(small) + (Exponential.Ln2 * (double)apart));
        }

        b = DoubleDouble.ScaleB(b, apart);
        var sum = a + b;
        var x = a / sum;
        var y = b / sum;
        return new Share(x, y, Logarithm.Of(x), Logarithm.Of(y));
    }
}
