namespace ModelLab.Statistics.Numerics;

/// <summary>Reads a decimal as written into a double and the remainder that rounding took away.</summary>
public static class DecimalReader
{
    /// <summary>
    /// Reads <c>[sign]digits[mark digits][e[sign]digits]</c>, nothing around it. Finite only; no thousands marks.
    /// </summary>
    /// <param name="text">The characters (ASCII digits).</param>
    /// <param name="decimalMark">'.' or ','.</param>
    /// <param name="value">The nearest double.</param>
    /// <param name="remainder">Decimal − value, to double accuracy; 0 where exact.</param>
    public static bool TryRead(ReadOnlySpan<char> text, char decimalMark, out double value, out double remainder) => throw new NotImplementedException();
}
