using System.Security.Cryptography;

namespace ModelLab.Ledger.Tests.Merkle;

/// <summary>
/// The definitions of RFC 9162 section 2.1 as they stand there, recursive, over the data themselves, sharing no code with
/// what is tested: MTH, PATH, PROOF and SUBPROOF.
/// </summary>
internal static class LiteralMerkleTree
{
    /// <summary>Section 2.1.1.</summary>
    public static byte[] Mth(byte[][] d) => d.Length switch
    {
        0 => SHA256.HashData([]),
        1 => SHA256.HashData([0x00, .. d[0]]),
        var n => SHA256.HashData([0x01, .. Mth(d[..K(n)]), .. Mth(d[K(n)..])]),
    };

    /// <summary>Section 2.1.3.1.</summary>
    public static byte[][] Path(int m, byte[][] d)
    {
        var n = d.Length;
        if (n == 1)
        {
            return [];
        }

        return m < K(n)
            ? [.. Path(m, d[..K(n)]), Mth(d[K(n)..])]
            : [.. Path(m - K(n), d[K(n)..]), Mth(d[..K(n)])];
    }

    /// <summary>Section 2.1.4.1.</summary>
    public static byte[][] Proof(int m, byte[][] d) => SubProof(m, d, true);

    private static byte[][] SubProof(int m, byte[][] d, bool complete)
    {
        var n = d.Length;
        if (m == n)
        {
            return complete ? [] : [Mth(d)];
        }

        return m <= K(n)
            ? [.. SubProof(m, d[..K(n)], complete), Mth(d[K(n)..])]
            : [.. SubProof(m - K(n), d[K(n)..], false), Mth(d[..K(n)])];
    }

    /// <summary>The largest power of two smaller than n: k &lt; n &lt;= 2k.</summary>
    private static int K(int n)
    {
        var k = 1;
        while (2 * k < n)
        {
            k *= 2;
        }

        return k;
    }
}
