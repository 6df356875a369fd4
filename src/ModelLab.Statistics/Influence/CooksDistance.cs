using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Influence;

/// <summary>
/// How far leaving one row out moves all fitted values together: D = r²h/(p(1 − h)), r the internally studentised residual and p the
/// number of coefficients, the intercept counted. Undefined where r is. Source: Cook (1977), "Detection of influential observation in
/// linear regression", Technometrics 19.
/// </summary>
public static class CooksDistance
{
    /// <summary>Cook's distance of a row.</summary>
    /// <param name="studentizedInternal">r, null where undefined.</param>
    /// <param name="leverage">h.</param>
    /// <param name="coefficients">p.</param>
    public static DoubleDouble? Of(DoubleDouble? studentizedInternal, DoubleDouble leverage, int coefficients) =>
        studentizedInternal is { } r && Leverage.Complement(leverage) is { } complement
            ? r * r * leverage / (complement * coefficients)
            : null;
}
