using System.Globalization;
using System.Numerics;

namespace ModelLab.Statistics.Tests.LeastSquares;

/// <summary>A fraction of whole numbers, for literal computation without any rounding.</summary>
public readonly record struct Fraction
{
    public Fraction(BigInteger numerator, BigInteger denominator)
    {
        var divisor = BigInteger.GreatestCommonDivisor(numerator, denominator) * (denominator.Sign < 0 ? -1 : 1);
        Numerator = numerator / divisor;
        Denominator = denominator / divisor;
    }

    public BigInteger Numerator { get; }

    public BigInteger Denominator { get; }

    public static Fraction Zero => new(0, 1);

    public static Fraction operator +(Fraction a, Fraction b) => new((a.Numerator * b.Denominator) + (b.Numerator * a.Denominator), a.Denominator * b.Denominator);

    public static Fraction operator -(Fraction a, Fraction b) => new((a.Numerator * b.Denominator) - (b.Numerator * a.Denominator), a.Denominator * b.Denominator);

    public static Fraction operator *(Fraction a, Fraction b) => new(a.Numerator * b.Numerator, a.Denominator * b.Denominator);

    public static Fraction operator /(Fraction a, Fraction b) => new(a.Numerator * b.Denominator, a.Denominator * b.Numerator);

    /// <summary>A double, exactly.</summary>
    public static Fraction Of(double value)
    {
        var bits = BitConverter.DoubleToInt64Bits(value);
        var power = (int)((bits >> 52) & 0x7FF);
        var mantissa = (BigInteger)(bits & 0xFFFFFFFFFFFFFL);
        mantissa = power == 0 ? mantissa : mantissa + BigInteger.Pow(2, 52);
        power = Math.Max(power, 1) - 1075;
        mantissa = bits < 0 ? -mantissa : mantissa;
        return power < 0 ? new Fraction(mantissa, BigInteger.Pow(2, -power)) : new Fraction(mantissa * BigInteger.Pow(2, power), 1);
    }

    /// <summary>A decimal as written, exactly.</summary>
    public static Fraction Parse(string text)
    {
        var parts = text.ToUpperInvariant().Split('E');
        var exponent = parts.Length > 1 ? int.Parse(parts[1], CultureInfo.InvariantCulture) : 0;
        var mark = parts[0].IndexOf('.', StringComparison.Ordinal);
        exponent -= mark < 0 ? 0 : parts[0].Length - mark - 1;
        var digits = BigInteger.Parse(parts[0].Replace(".", "", StringComparison.Ordinal), NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture);
        return exponent < 0 ? new Fraction(digits, BigInteger.Pow(10, -exponent)) : new Fraction(digits * BigInteger.Pow(10, exponent), 1);
    }

    public Fraction Abs() => new(BigInteger.Abs(Numerator), Denominator);

    public int CompareTo(Fraction other) => ((Numerator * other.Denominator) - (other.Numerator * Denominator)).Sign;

    /// <summary>As a double, good to more digits than it holds.</summary>
    public double ToDouble()
    {
        if (Numerator.IsZero)
        {
            return 0.0;
        }

        var shift = 62 - (int)(BigInteger.Abs(Numerator).GetBitLength() - Denominator.GetBitLength());
        var quotient = shift >= 0 ? (Numerator << shift) / Denominator : Numerator / (Denominator << -shift);
        return Math.ScaleB((double)(long)quotient, -shift);
    }
}

/// <summary>
/// Least squares by the letter: the normal equations in fractions of whole numbers, solved by elimination. Slow, and without any rounding.
/// </summary>
public sealed class LiteralLeastSquares
{
    public LiteralLeastSquares(Fraction[][] x, Fraction[] y)
    {
        var columns = x[0].Length;
        var equations = new Fraction[columns][];
        for (var i = 0; i < columns; i++)
        {
            equations[i] = new Fraction[columns + 1 + columns];
            for (var j = 0; j < columns; j++)
            {
                equations[i][j] = Sum(x.Select(row => row[i] * row[j]));
                equations[i][columns + 1 + j] = i == j ? new Fraction(1, 1) : Fraction.Zero;
            }

            equations[i][columns] = Sum(x.Zip(y, (row, value) => row[i] * value));
        }

        Eliminate(equations, columns);
        Coefficients = [.. equations.Select(row => row[columns])];
        Inverse = [.. equations.Select(row => row[(columns + 1)..])];
        Residuals = [.. x.Zip(y, (row, value) => value - Sum(row.Zip(Coefficients, (a, b) => a * b)))];
        ResidualSumOfSquares = Sum(Residuals.Select(e => e * e));
        Leverages = [.. x.Select(row => Sum(row.SelectMany((a, i) => row.Select((b, j) => a * b * Inverse[i][j]))))];
    }

    public Fraction[] Coefficients { get; }

    /// <summary>(X'X)⁻¹.</summary>
    public Fraction[][] Inverse { get; }

    public Fraction[] Residuals { get; }

    public Fraction[] Leverages { get; }

    public Fraction ResidualSumOfSquares { get; }

    public static Fraction Sum(IEnumerable<Fraction> values) => values.Aggregate(Fraction.Zero, (sum, value) => sum + value);

    private static void Eliminate(Fraction[][] rows, int columns)
    {
        for (var pivot = 0; pivot < columns; pivot++)
        {
            var at = Array.FindIndex(rows, pivot, row => !row[pivot].Numerator.IsZero);
            (rows[pivot], rows[at]) = (rows[at], rows[pivot]);
            var scale = rows[pivot][pivot];
            rows[pivot] = [.. rows[pivot].Select(value => value / scale)];
            for (var row = 0; row < columns; row++)
            {
                if (row != pivot && !rows[row][pivot].Numerator.IsZero)
                {
                    var factor = rows[row][pivot];
                    rows[row] = [.. rows[row].Zip(rows[pivot], (a, b) => a - (factor * b))];
                }
            }
        }
    }
}
