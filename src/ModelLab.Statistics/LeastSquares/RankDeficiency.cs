using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Statistics.LeastSquares;

/// <summary>
/// Finds columns that the columns before them determine.
/// </summary>
/// <remarks>
/// <para>
/// With q the length of what is left of a column once its regression on the columns before it is taken out, the column counts as
/// determined where q ≤ <see cref="Tolerance"/> · (length of the column about its mean; about zero without intercept) — that is, where
/// the squared multiple correlation with those columns comes within 10⁻²⁶ of one — or where q is lost in the rounding of
/// double-double, q ≤ <see cref="RoundingTolerance"/> · (length about zero). Measured about the mean, a large level with small
/// differences is no deficiency.
/// </para>
/// <para>
/// The bound is far below what separates columns that differ as written: the powers 1 to 10 of the Filip set (the hardest of the
/// published reference sets) come down to 6·10⁻⁸, the Longley set to 4·10⁻². A total that was computed in double from its parts and
/// written with 15 or more digits lies below the bound and is found.
/// </para>
/// </remarks>
internal static class RankDeficiency
{
    /// <summary>Smallest share of a column's length that must be its own.</summary>
    public const double Tolerance = 1e-13;

    /// <summary>The same against the length about zero, where rounding of double-double takes over.</summary>
    public const double RoundingTolerance = 1e-26;

    // A column takes part in a combination where its share of the length exceeds this; below lies what the near dependence leaves open.
    private const double Share = 1e-7;

    /// <summary>Refuses a design whose columns are not independent.</summary>
    /// <exception cref="ModelRefusedException">Rank deficient; names every determined column with those that determine it.</exception>
    public static void Check(Design design, OrthogonalTriangle triangle)
    {
        var intercept = design.Specification.Intercept;
        for (var column = 0; column < design.Columns.Count; column++)
        {
            if (IsDetermined(triangle[column, column], column, row => triangle[row, column], intercept))
            {
                Refuse(design, triangle);
            }
        }
    }

    private static bool IsDetermined(DoubleDouble own, int column, Func<int, DoubleDouble> element, bool intercept)
    {
        var square = DoubleDouble.Zero;
        for (var row = column; row >= 1; row--)
        {
            square += element(row) * element(row);
        }

        var whole = column == 0 ? own * own : square + (element(0) * element(0));
        var about = intercept && column > 0 ? square : whole;
        var size = Math.Abs(own.Hi);
        return size <= Tolerance * Math.Sqrt(about.Hi) || size <= RoundingTolerance * Math.Sqrt(whole.Hi);
    }

    // Starts over from the triangle (its columns have the same inner products as the design's), leaving determined columns aside.
    private static void Refuse(Design design, OrthogonalTriangle triangle)
    {
        var count = design.Columns.Count;
        var intercept = design.Specification.Intercept;
        var kept = new List<int>();
        var basis = new List<DoubleDouble[]>();
        var factors = new List<DoubleDouble[]>();
        var aliases = new List<Alias>();
        for (var column = 0; column < count; column++)
        {
            var rest = new DoubleDouble[count];
            for (var row = 0; row <= column; row++)
            {
                rest[row] = triangle[row, column];
            }

            var own = Project(rest, basis, out var onto);
            var whole = Root(SumOfSquares(onto) + (own * own));
            var about = intercept && column > 0 ? Root(SumOfSquares(onto.AsSpan(1)) + (own * own)) : whole;
            if (own.Hi <= Tolerance * about || own.Hi <= RoundingTolerance * whole)
            {
                aliases.Add(Name(design, column, onto, kept, factors, about));
                continue;
            }

            for (var row = 0; row < count; row++)
            {
                rest[row] /= own;
            }

            basis.Add(rest);
            factors.Add([.. onto, own]);
            kept.Add(column);
        }

        var sentences = aliases.Select(alias => $"'{alias.Column}' is determined by {string.Join(", ", alias.DeterminedBy.Select(name => $"'{name}'"))}");
        throw new ModelRefusedException(
            ModelRefusal.RankDeficient,
            $"Some columns of the model are combinations of others on the analysed rows: {string.Join("; ", sentences)}. Take one of each set out.",
            VariablesOf(design, aliases),
            aliases);
    }

    private static string[] VariablesOf(Design design, List<Alias> aliases)
    {
        var texts = aliases.SelectMany(alias => alias.DeterminedBy.Prepend(alias.Column)).ToHashSet(StringComparer.Ordinal);
        return [.. design.Columns.Where(column => texts.Contains(column.Text)).SelectMany(column => column.Term?.Variables ?? []).Distinct(StringComparer.Ordinal)];
    }

    // Takes the parts along the basis out of a vector, twice (Gram and Schmidt, repeated); returns the length of what is left.
    private static DoubleDouble Project(DoubleDouble[] vector, List<DoubleDouble[]> basis, out DoubleDouble[] onto)
    {
        onto = new DoubleDouble[basis.Count];
        for (var round = 0; round < 2; round++)
        {
            for (var b = 0; b < basis.Count; b++)
            {
                var inner = DoubleDouble.Zero;
                for (var row = 0; row < vector.Length; row++)
                {
                    inner += basis[b][row] * vector[row];
                }

                for (var row = 0; row < vector.Length; row++)
                {
                    vector[row] -= inner * basis[b][row];
                }

                onto[b] += inner;
            }
        }

        return DoubleDouble.Sqrt(SumOfSquares(vector));
    }

    private static Alias Name(Design design, int column, DoubleDouble[] onto, List<int> kept, List<DoubleDouble[]> factors, double length)
    {
        var names = new List<string>();
        var right = onto.ToArray();
        for (var k = kept.Count - 1; k >= 0; k--)
        {
            var coefficient = right[k] / factors[k][k];
            for (var row = 0; row < k; row++)
            {
                right[row] -= coefficient * factors[k][row];
            }

            var own = kept[k] == 0 && design.Specification.Intercept
                ? Math.Abs(factors[k][k].Hi)
                : Root(SumOfSquares(factors[k].AsSpan(design.Specification.Intercept ? 1 : 0)));
            if (Math.Abs(coefficient.Hi) * own > Share * length)
            {
                names.Insert(0, design.Columns[kept[k]].Text);
            }
        }

        return new Alias(design.Columns[column].Text, names);
    }

    private static DoubleDouble SumOfSquares(ReadOnlySpan<DoubleDouble> values)
    {
        var sum = DoubleDouble.Zero;
        foreach (var value in values)
        {
            sum += value * value;
        }

        return sum;
    }

    private static double Root(DoubleDouble value) => Math.Sqrt(value.Hi);
}
