using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Influence;
using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>Row-wise results, one value a row analysed, in the order of the rows.</summary>
/// <param name="Fitted">ŷ.</param>
/// <param name="Residual">y − ŷ.</param>
/// <param name="Leverage">Diagonal of X(X'X)⁻¹X'.</param>
/// <param name="StudentizedInternal">e/(s√(1 − h)); null where s = 0 or h = 1.</param>
/// <param name="StudentizedExternal">The same with s of the fit without the row.</param>
/// <param name="CooksDistance">r²h/(p(1 − h)), r internally studentised (Cook 1977).</param>
public sealed record RowResults(
    double[] Fitted, double[] Residual, double[] Leverage,
    double?[] StudentizedInternal, double?[] StudentizedExternal, double?[] CooksDistance);

/// <summary>A fitted model: its figures, and its rows when asked.</summary>
public sealed class FittedModel
{
    private readonly LeastSquaresFit fit;

    internal FittedModel(LeastSquaresFit fit, FitOptions options)
    {
        this.fit = fit;
        var coefficients = CoefficientFigures.Of(fit, options.Confidence);
        var tests = TermTests.Of(fit, coefficients, options.HeldIn);
        Results = new ModelResults(
            FitFigures.Of(fit, options.FullModelMeanSquare),
            coefficients,
            [.. tests.Select(test => test.Result)],
            TermLosses.Of(fit, tests),
            AnalysisOfVariance.Of(fit));
    }

    /// <summary>The design that was fitted; its codings tell reference categories and those left out.</summary>
    public Design Design => fit.Design;

    /// <summary>The figures.</summary>
    public ModelResults Results { get; }

    /// <summary>Computes the row-wise results.</summary>
    public RowResults Rows()
    {
        var count = fit.Rows;
        var results = new RowResults(
            new double[count], new double[count], new double[count], new double?[count], new double?[count], new double?[count]);
        var outcomes = OutcomeValues();
        var exponent = fit.Design.OutcomeExponent;
        for (var row = 0; row < count; row++)
        {
            var residual = fit.Residuals[row];
            var leverage = fit.Leverages[row];
            var internally = StudentizedResiduals.Internal(residual, leverage, fit.ResidualSumOfSquares, fit.ResidualDegrees);
            results.Fitted[row] = DoubleDouble.ScaleB(outcomes[row] - residual, exponent).Hi;
            results.Residual[row] = DoubleDouble.ScaleB(residual, exponent).Hi;
            results.Leverage[row] = leverage.Hi;
            results.StudentizedInternal[row] = internally?.Hi;
            results.StudentizedExternal[row] = StudentizedResiduals.External(residual, leverage, fit.ResidualSumOfSquares, fit.ResidualDegrees)?.Hi;
            results.CooksDistance[row] = CooksDistance.Of(internally, leverage, fit.Columns)?.Hi;
        }

        return results;
    }

    private DoubleDouble[] OutcomeValues()
    {
        var values = new DoubleDouble[fit.Rows];
        var block = new DesignBlock(Math.Min(RowRanges.Block, fit.Rows), fit.Columns + 1);
        for (var start = 0; start < fit.Rows; start += RowRanges.Block)
        {
            var rows = Math.Min(RowRanges.Block, fit.Rows - start);
            fit.Design.Fill(start, rows, block);
            for (var row = 0; row < rows; row++)
            {
                values[start + row] = DoubleDouble.FromSum(block.Hi(fit.Columns)[row], block.Lo(fit.Columns)[row]);
            }
        }

        return values;
    }
}
