using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Designs;

/// <summary>
/// A run of rows of a design in double-double, column by column, the outcome last. Rows beyond those filled are zero.
/// </summary>
internal sealed class DesignBlock
{
    private readonly double[] high;
    private readonly double[] low;
    private readonly int stride;

    /// <summary>Makes room for rows and columns (the outcome counted).</summary>
    public DesignBlock(int rows, int columns)
    {
        Length = DoubleDoubleLanes.Padded(rows);
        stride = Length + DoubleDoubleLanes.Width; // columns a power of two apart would share cache lines
        Columns = columns;
        high = new double[stride * columns];
        low = new double[stride * columns];
    }

    /// <summary>Rows of each column, padding counted; a multiple of the lane width.</summary>
    public int Length { get; }

    /// <summary>Number of columns, the outcome counted.</summary>
    public int Columns { get; }

    /// <summary>High parts of a column.</summary>
    public Span<double> Hi(int column) => high.AsSpan(column * stride, Length);

    /// <summary>Low parts of a column.</summary>
    public Span<double> Lo(int column) => low.AsSpan(column * stride, Length);
}
