using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.LeastSquares;

/// <summary>
/// The triangular factor R of a matrix [X y], gathered from its rows block by block: R'R = [X y]'[X y], in double-double.
/// </summary>
/// <remarks>
/// Each block of rows is stacked under R and brought to zero by Householder reflections (Householder 1958; Golub and Van Loan,
/// Matrix Computations, 4th ed., section 5.2), of which only the one row of R and the block take part. Beyond the block only R is
/// stored. The last column is the outcome; the last diagonal element is the root of the residual sum of squares.
/// </remarks>
internal sealed class OrthogonalTriangle(int columns)
{
    private readonly DoubleDouble[] elements = new DoubleDouble[columns * columns];

    /// <summary>Number of columns, the outcome counted.</summary>
    public int Columns { get; } = columns;

    /// <summary>Element of the triangle, row ≤ column.</summary>
    public DoubleDouble this[int row, int column]
    {
        get => elements[(row * Columns) + column];
        private set => elements[(row * Columns) + column] = value;
    }

    /// <summary>Takes the rows of a block in. The block is used up.</summary>
    public void Absorb(DesignBlock block)
    {
        for (var pivot = 0; pivot < Columns; pivot++)
        {
            ReadOnlySpan<double> hi = block.Hi(pivot);
            ReadOnlySpan<double> lo = block.Lo(pivot);
            var below = DoubleDoubleLanes.Dot(hi, lo, hi, lo);
            if (below.IsZero)
            {
                continue;
            }

            var diagonal = this[pivot, pivot];
            var norm = DoubleDouble.Sqrt((diagonal * diagonal) + below);
            var reflected = diagonal > DoubleDouble.Zero ? -norm : norm;
            var top = diagonal - reflected;
            var factor = DoubleDouble.One / (norm * (norm + DoubleDouble.Abs(diagonal)));
            for (var column = pivot + 1; column < Columns; column++)
            {
                var targetHi = block.Hi(column);
                var targetLo = block.Lo(column);
                var inner = (top * this[pivot, column]) + DoubleDoubleLanes.Dot(hi, lo, targetHi, targetLo);
                var multiple = factor * inner;
                this[pivot, column] -= multiple * top;
                DoubleDoubleLanes.SubtractMultiple(multiple, hi, lo, targetHi, targetLo);
            }

            this[pivot, pivot] = reflected;
        }
    }

    /// <summary>Takes the rows of another triangle in.</summary>
    public void Absorb(OrthogonalTriangle other)
    {
        var block = new DesignBlock(Columns, Columns);
        for (var column = 0; column < Columns; column++)
        {
            var hi = block.Hi(column);
            var lo = block.Lo(column);
            for (var row = 0; row <= column; row++)
            {
                hi[row] = other[row, column].Hi;
                lo[row] = other[row, column].Lo;
            }
        }

        Absorb(block);
    }
}
