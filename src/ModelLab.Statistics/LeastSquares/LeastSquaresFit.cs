using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.LeastSquares;

/// <summary>
/// The least-squares solution of a design in double-double, with what inference needs of it. Everything is in the scaled units of the
/// design (<see cref="Design.Exponent"/>, <see cref="Design.OutcomeExponent"/>).
/// </summary>
internal sealed class LeastSquaresFit
{
    private readonly OrthogonalTriangle triangle;
    private readonly DoubleDouble[] coefficients;
    private readonly DoubleDouble[] inverse;

    private LeastSquaresFit(Design design, OrthogonalTriangle triangle)
    {
        Design = design;
        this.triangle = triangle;
        coefficients = Solve();
        inverse = Invert();
        var pass = RowPass.Run(design, triangle, coefficients);
        Residuals = pass.Residuals;
        Leverages = pass.Leverages;
        TotalSumOfSquares = pass.TotalSumOfSquares;
        IsExact = ExactFit.Holds(this, pass.ResidualSumOfSquares);
        ResidualSumOfSquares = IsExact ? DoubleDouble.Zero : pass.ResidualSumOfSquares;
    }

    /// <summary>The design.</summary>
    public Design Design { get; }

    /// <summary>Rows analysed, n.</summary>
    public int Rows => Design.Rows;

    /// <summary>Coefficients, p.</summary>
    public int Columns => coefficients.Length;

    /// <summary>Residual degrees of freedom, n − p.</summary>
    public int ResidualDegrees => Rows - Columns;

    /// <summary>RSS; zero at an exact fit.</summary>
    public DoubleDouble ResidualSumOfSquares { get; }

    /// <summary>SST, about the mean; about zero without intercept.</summary>
    public DoubleDouble TotalSumOfSquares { get; }

    /// <summary>RSS/(n − p).</summary>
    public DoubleDouble MeanSquare => ResidualSumOfSquares / ResidualDegrees;

    /// <summary>Whether the residual sum of squares is only rounding.</summary>
    public bool IsExact { get; }

    /// <summary>Residuals, row by row.</summary>
    public DoubleDouble[] Residuals { get; }

    /// <summary>Leverages, row by row.</summary>
    public DoubleDouble[] Leverages { get; }

    /// <summary>Solves a design.</summary>
    /// <exception cref="ModelRefusedException">The columns are not independent.</exception>
    public static LeastSquaresFit Solve(Design design)
    {
        var triangle = Triangle(design);
        RankDeficiency.Check(design, triangle);
        return new LeastSquaresFit(design, triangle);
    }

    /// <summary>The triangular factor of the design with its outcome.</summary>
    internal static OrthogonalTriangle Triangle(Design design)
    {
        var columns = design.Columns.Count + 1;
        var parts = new OrthogonalTriangle[RowRanges.Stretches(design.Rows)];
        RowRanges.ForEachStretch(design.Rows, (stretch, from, to) =>
        {
            var part = new OrthogonalTriangle(columns);
            var block = new DesignBlock(Math.Min(RowRanges.Block, to - from), columns);
            for (var start = from; start < to; start += RowRanges.Block)
            {
                design.Fill(start, Math.Min(RowRanges.Block, to - start), block);
                part.Absorb(block);
            }

            parts[stretch] = part;
        });

        for (var stretch = 1; stretch < parts.Length; stretch++)
        {
            parts[0].Absorb(parts[stretch]);
        }

        return parts[0];
    }

    /// <summary>Coefficient of a column.</summary>
    public DoubleDouble Coefficient(int column) => coefficients[column];

    /// <summary>Element of R, row ≤ column; the column after the last is Q'y.</summary>
    public DoubleDouble Triangular(int row, int column) => triangle[row, column];

    /// <summary>Element of (X'X)⁻¹.</summary>
    public DoubleDouble CrossProductInverse(int row, int column)
    {
        var sum = DoubleDouble.Zero;
        for (var k = Columns - 1; k >= Math.Max(row, column); k--)
        {
            sum += inverse[(row * Columns) + k] * inverse[(column * Columns) + k];
        }

        return sum;
    }

    /// <summary>Σ of products of two columns about their means; about zero without intercept.</summary>
    public DoubleDouble CentredProduct(int first, int second)
    {
        var sum = DoubleDouble.Zero;
        for (var row = Math.Min(first, second); row >= (Design.Specification.Intercept ? 1 : 0); row--)
        {
            sum += triangle[row, first] * triangle[row, second];
        }

        return sum;
    }

    private DoubleDouble[] Solve()
    {
        var count = triangle.Columns - 1;
        var solution = new DoubleDouble[count];
        for (var row = count - 1; row >= 0; row--)
        {
            var right = triangle[row, count];
            for (var column = row + 1; column < count; column++)
            {
                right -= triangle[row, column] * solution[column];
            }

            solution[row] = right / triangle[row, row];
        }

        return solution;
    }

    // R⁻¹, upper triangular, row by row.
    private DoubleDouble[] Invert()
    {
        var count = Columns;
        var result = new DoubleDouble[count * count];
        for (var column = 0; column < count; column++)
        {
            result[(column * count) + column] = DoubleDouble.One / triangle[column, column];
        }

        for (var row = count - 2; row >= 0; row--)
        {
            var scale = -result[(row * count) + row];
            for (var column = row + 1; column < count; column++)
            {
                var sum = DoubleDouble.Zero;
                for (var k = row + 1; k <= column; k++)
                {
                    sum += triangle[row, k] * result[(k * count) + column];
                }

                result[(row * count) + column] = scale * sum;
            }
        }

        return result;
    }
}
