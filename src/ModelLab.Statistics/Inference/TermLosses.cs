using ModelLab.Statistics.LeastSquares;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// What the model would lose with each removable term, from the fit alone: without a term of q columns RSS rises by its sum of squares
/// and n − p by q, so that R² falls by SS/SST, −2LL rises by n ln(1 + SS/RSS), and the criteria lose the q parameters' penalty.
/// </summary>
internal static class TermLosses
{
    /// <summary>The removable terms in their order.</summary>
    public static IReadOnlyList<TermLoss> Of(LeastSquaresFit fit, IReadOnlyList<TermTest> tests) =>
        [.. tests.Where(test => test.Result.Removable).Select(test => Of(fit, test.Result, test.Rise))];

    private static TermLoss Of(LeastSquaresFit fit, TermResult term, DoubleDouble rise)
    {
        var loss = new TermLoss(
            term.Term, term.Df, term.F, term.P, term.SumOfSquares, (rise / fit.TotalSumOfSquares).Hi, null, null, null, null);
        if (fit.IsExact)
        {
            return loss;
        }

        var rows = fit.Rows;
        var deviance = InformationCriteria.DevianceRise(rise / fit.ResidualSumOfSquares, rows);
        var meanSquareWithout = (fit.ResidualSumOfSquares + rise) / (fit.ResidualDegrees + term.Df);
        var totalDegrees = rows - (fit.Design.Specification.Intercept ? 1 : 0);
        return loss with
        {
            AdjustedRSquaredChange = ((fit.MeanSquare - meanSquareWithout) / (fit.TotalSumOfSquares / totalDegrees)).Hi,
            AicChange = deviance - (2.0 * term.Df),
            AiccChange = deviance
                + (InformationCriteria.SmallSamplePenalty(fit.Columns - term.Df, rows) - InformationCriteria.SmallSamplePenalty(fit.Columns, rows)),
            BicChange = deviance - (term.Df * Math.Log(rows)),
        };
    }
}
