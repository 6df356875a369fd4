using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Influence;

/// <summary>
/// The leverage h of a row: its diagonal element of the hat matrix X(X'X)⁻¹X', between 0 and 1 (from 1/n on with intercept), p in sum.
/// </summary>
/// <remarks>
/// A row with leverage 1 is fitted exactly whatever its outcome: nothing is left to judge it by. Leverages are computed with the fit in
/// double-double; one counts as 1 where it cannot be told from 1 in double. Source: Hoaglin and Welsch (1978), "The hat matrix in
/// regression and anova", The American Statistician 32.
/// </remarks>
public static class Leverage
{
    /// <summary>1 − h, or null where the leverage is 1.</summary>
    public static DoubleDouble? Complement(DoubleDouble leverage)
    {
        var complement = DoubleDouble.One - leverage;
        return complement.Hi > 1.0 / (1L << 53) ? complement : null;
    }
}
