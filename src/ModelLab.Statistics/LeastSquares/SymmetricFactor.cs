using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.LeastSquares;

/// <summary>
/// The lower triangular L with A = LL' of a small positive definite matrix (Cholesky's factor), in double-double.
/// </summary>
internal sealed class SymmetricFactor
{
    private readonly DoubleDouble[] elements;
    private readonly int size;

    private SymmetricFactor(int size)
    {
        this.size = size;
        elements = new DoubleDouble[size * size];
    }

    /// <summary>Element of L, row ≥ column.</summary>
    public DoubleDouble this[int row, int column] => elements[(row * size) + column];

    /// <summary>Factors a matrix given by its elements on and below the diagonal.</summary>
    public static SymmetricFactor Of(int size, Func<int, int, DoubleDouble> element)
    {
        var factor = new SymmetricFactor(size);
        for (var row = 0; row < size; row++)
        {
            for (var column = 0; column <= row; column++)
            {
                var value = element(row, column);
                for (var k = 0; k < column; k++)
                {
                    value -= factor[row, k] * factor[column, k];
                }

                factor.elements[(row * size) + column] = row == column ? DoubleDouble.Sqrt(value) : value / factor[column, column];
            }
        }

        return factor;
    }
}
