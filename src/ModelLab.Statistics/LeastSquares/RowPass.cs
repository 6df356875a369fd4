using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.LeastSquares;

/// <summary>
/// The second walk over the rows of a design: residuals y − Xb, leverages, and their sums of squares.
/// </summary>
/// <remarks>
/// The leverage of a row is the squared length of its row of Q = XR⁻¹ (Hoaglin and Welsch 1978, "The hat matrix in regression and
/// anova"), formed by substitution in double-double.
/// </remarks>
internal sealed class RowPass
{
    private readonly Design design;
    private readonly OrthogonalTriangle triangle;
    private readonly DoubleDouble[] coefficients;
    private readonly DoubleDouble[] reciprocals;
    private readonly DoubleDouble centre;
    private readonly DoubleDouble[] blockResidual;
    private readonly DoubleDouble[] blockTotal;

    private RowPass(Design design, OrthogonalTriangle triangle, DoubleDouble[] coefficients)
    {
        this.design = design;
        this.triangle = triangle;
        this.coefficients = coefficients;
        var count = coefficients.Length;
        reciprocals = new DoubleDouble[count];
        for (var column = 0; column < count; column++)
        {
            reciprocals[column] = DoubleDouble.One / triangle[column, column];
        }

        // With the intercept as first column, its reflection leaves the mean of the outcome.
        centre = design.Specification.Intercept ? triangle[0, count] / triangle[0, 0] : DoubleDouble.Zero;
        Residuals = new DoubleDouble[design.Rows];
        Leverages = new DoubleDouble[design.Rows];
        blockResidual = new DoubleDouble[RowRanges.Blocks(design.Rows)];
        blockTotal = new DoubleDouble[blockResidual.Length];
    }

    /// <summary>y − ŷ of each row.</summary>
    public DoubleDouble[] Residuals { get; }

    /// <summary>Leverage of each row.</summary>
    public DoubleDouble[] Leverages { get; }

    /// <summary>Σ(y − ŷ)².</summary>
    public DoubleDouble ResidualSumOfSquares { get; private set; }

    /// <summary>Σ(y − ȳ)²; Σy² without intercept.</summary>
    public DoubleDouble TotalSumOfSquares { get; private set; }

    /// <summary>Walks over all rows.</summary>
    public static RowPass Run(Design design, OrthogonalTriangle triangle, DoubleDouble[] coefficients)
    {
        var pass = new RowPass(design, triangle, coefficients);
        RowRanges.ForEachStretch(design.Rows, (_, from, to) => pass.Walk(from, to));
        for (var block = 0; block < pass.blockResidual.Length; block++)
        {
            pass.ResidualSumOfSquares += pass.blockResidual[block];
            pass.TotalSumOfSquares += pass.blockTotal[block];
        }

        return pass;
    }

    private void Walk(int from, int to)
    {
        var count = coefficients.Length;
        var extra = count + 1;
        var block = new DesignBlock(Math.Min(RowRanges.Block, to - from), count + 2);
        for (var start = from; start < to; start += RowRanges.Block)
        {
            var rows = Math.Min(RowRanges.Block, to - start);
            design.Fill(start, rows, block);
            blockTotal[start / RowRanges.Block] = Total(block, count, extra);
            for (var column = 0; column < count; column++)
            {
                DoubleDoubleLanes.SubtractMultiple(coefficients[column], block.Hi(column), block.Lo(column), block.Hi(count), block.Lo(count));
            }

            blockResidual[start / RowRanges.Block] = SumOfSquares(block, count);
            Copy(block, count, Residuals.AsSpan(start, rows));
            FormLeverages(block, count, extra);
            Copy(block, extra, Leverages.AsSpan(start, rows));
        }
    }

    private DoubleDouble Total(DesignBlock block, int outcome, int extra)
    {
        if (!design.Specification.Intercept)
        {
            return SumOfSquares(block, outcome);
        }

        block.Hi(outcome).CopyTo(block.Hi(extra));
        block.Lo(outcome).CopyTo(block.Lo(extra));
        DoubleDoubleLanes.SubtractMultiple(centre, block.Hi(0), block.Lo(0), block.Hi(extra), block.Lo(extra));
        return SumOfSquares(block, extra);
    }

    private void FormLeverages(DesignBlock block, int count, int target)
    {
        block.Hi(target).Clear();
        block.Lo(target).Clear();
        for (var column = 0; column < count; column++)
        {
            DoubleDoubleLanes.Multiply(reciprocals[column], block.Hi(column), block.Lo(column));
            DoubleDoubleLanes.AddSquare(block.Hi(column), block.Lo(column), block.Hi(target), block.Lo(target));
            for (var later = column + 1; later < count; later++)
            {
                DoubleDoubleLanes.SubtractMultiple(triangle[column, later], block.Hi(column), block.Lo(column), block.Hi(later), block.Lo(later));
            }
        }
    }

    private static DoubleDouble SumOfSquares(DesignBlock block, int column) =>
        DoubleDoubleLanes.Dot(block.Hi(column), block.Lo(column), block.Hi(column), block.Lo(column));

    private static void Copy(DesignBlock block, int column, Span<DoubleDouble> target)
    {
        ReadOnlySpan<double> hi = block.Hi(column);
        ReadOnlySpan<double> lo = block.Lo(column);
        for (var row = 0; row < target.Length; row++)
        {
            target[row] = DoubleDouble.FromSum(hi[row], lo[row]);
        }
    }
}
