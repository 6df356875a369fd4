using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Designs;

/// <summary>
/// How a column of a design is formed from its variable. Columns are scaled by a power of two, which is exact, so that the largest
/// magnitude lies between 1 and 2 (for a power: of the variable before it is raised); the units of the variables then do not matter.
/// </summary>
internal abstract class ColumnForm
{
    /// <summary>The column is 2^Exponent times what <see cref="Fill"/> writes.</summary>
    public virtual int Exponent => 0;

    /// <summary>Writes the values of the table's rows; what lies behind them is set to zero.</summary>
    public abstract void Fill(ReadOnlySpan<int> rows, Span<double> high, Span<double> low);
}

/// <summary>The intercept: ones.</summary>
internal sealed class InterceptForm : ColumnForm
{
    /// <inheritdoc/>
    public override void Fill(ReadOnlySpan<int> rows, Span<double> high, Span<double> low)
    {
        high[..rows.Length].Fill(1.0);
        high[rows.Length..].Clear();
        low.Clear();
    }
}

/// <summary>One where a row has the category, zero elsewhere.</summary>
internal sealed class IndicatorForm(CategoryColumn column, int category) : ColumnForm
{
    /// <inheritdoc/>
    public override void Fill(ReadOnlySpan<int> rows, Span<double> high, Span<double> low)
    {
        var codes = column.Codes;
        for (var i = 0; i < rows.Length; i++)
        {
            high[i] = codes[rows[i]] == category ? 1.0 : 0.0;
        }

        high[rows.Length..].Clear();
        low.Clear();
    }
}

/// <summary>A numeric variable or a whole power of it.</summary>
internal sealed class NumberForm(NumberColumn column, int exponent, int degree) : ColumnForm
{
    private readonly double scale = Math.ScaleB(1.0, -exponent);

    /// <inheritdoc/>
    public override int Exponent => exponent * degree;

    /// <inheritdoc/>
    public override void Fill(ReadOnlySpan<int> rows, Span<double> high, Span<double> low)
    {
        var values = column.Values;
        var remainders = column.Remainders;
        for (var i = 0; i < rows.Length; i++)
        {
            var row = rows[i];
            var number = DoubleDouble.FromSum(values[row] * scale, remainders.IsEmpty ? 0.0 : remainders[row] * scale);
            if (degree > 1)
            {
                number = DoubleDouble.Pow(number, degree);
            }

            high[i] = number.Hi;
            low[i] = number.Lo;
        }

        high[rows.Length..].Clear();
        low[rows.Length..].Clear();
    }
}
