namespace ModelLab.Web.Features.Demo.Data;

/// <summary>Draws from the distributions that the demo data are made of.</summary>
/// <param name="generator">Where the uniform numbers come from.</param>
public sealed class Variates(Xoshiro256StarStar generator)
{
    private double? spare;

    /// <summary>Standard normal, by the polar method (Marsaglia and Bray 1964): two a turn, the second kept for the next call.</summary>
    public double Normal()
    {
        if (spare is { } kept)
        {
            spare = null;
            return kept;
        }

        while (true)
        {
            var a = (2 * generator.NextUnit()) - 1;
            var b = (2 * generator.NextUnit()) - 1;
            var q = (a * a) + (b * b);
            if (q is > 0 and < 1)
            {
                var factor = Math.Sqrt(-2 * Math.Log(q) / q);
                spare = b * factor;
                return a * factor;
            }
        }
    }

    /// <summary>True with the given probability.</summary>
    public bool Happens(double probability) => generator.NextUnit() < probability;

    /// <summary>An index with the given probabilities, which add up to 1.</summary>
    public int Pick(ReadOnlySpan<double> probabilities)
    {
        var u = generator.NextUnit();
        var sum = 0.0;
        for (var i = 0; i < probabilities.Length - 1; i++)
        {
            sum += probabilities[i];
            if (u < sum)
            {
                return i;
            }
        }

        return probabilities.Length - 1;
    }

    /// <summary>Successes in so many independent trials.</summary>
    public int Binomial(int trials, double probability)
    {
        var successes = 0;
        for (var i = 0; i < trials; i++)
        {
            successes += Happens(probability) ? 1 : 0;
        }

        return successes;
    }

    /// <summary>Gamma of a whole shape: −scale · ln of the product of so many uniform numbers.</summary>
    public double Gamma(int shape, double scale)
    {
        var product = 1.0;
        for (var i = 0; i < shape; i++)
        {
            product *= 1 - generator.NextUnit();
        }

        return -scale * Math.Log(product);
    }

    /// <summary>Log-normal, rounded to tenths and drawn again until it lies between the ends.</summary>
    /// <param name="median">exp of the mean of the logarithm.</param>
    /// <param name="sigma">SD of the logarithm.</param>
    /// <param name="lowest">Least value kept.</param>
    /// <param name="highest">Greatest value kept.</param>
    public double LogNormal(double median, double sigma, double lowest, double highest)
    {
        while (true)
        {
            var value = Round(median * Math.Exp(sigma * Normal()), 10);
            if (value >= lowest && value <= highest)
            {
                return value;
            }
        }
    }

    /// <summary>Rounds to so many parts of a unit, halves away from zero; never gives a negative zero.</summary>
    public static double Round(double value, double partsOfUnit) => (Math.Round(value * partsOfUnit, MidpointRounding.AwayFromZero) / partsOfUnit) + 0.0;
}
