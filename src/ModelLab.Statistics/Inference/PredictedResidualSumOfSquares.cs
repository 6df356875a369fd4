using ModelLab.Statistics.Influence;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.Inference;

/// <summary>
/// PRESS = Σ(e/(1 − h))²: the sum of squares of the errors with which each row is predicted by the fit to all others. Undefined where
/// a leverage is 1, because that row's fit would not exist. Source: Allen (1974), "The relationship between variable selection and
/// data augmentation and a method for prediction", Technometrics 16.
/// </summary>
public static class PredictedResidualSumOfSquares
{
    /// <summary>PRESS, in the square of the residuals' unit.</summary>
    public static DoubleDouble? Of(ReadOnlySpan<DoubleDouble> residuals, ReadOnlySpan<DoubleDouble> leverages)
    {
        var sum = DoubleDouble.Zero;
        for (var row = 0; row < residuals.Length; row++)
        {
            if (Leverage.Complement(leverages[row]) is not { } complement)
            {
                return null;
            }

            var error = residuals[row] / complement;
            sum += error * error;
        }

        return sum;
    }
}
