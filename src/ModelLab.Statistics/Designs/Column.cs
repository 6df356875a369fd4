namespace ModelLab.Statistics.Designs;

/// <summary>One variable of a <see cref="DataTable"/>: numbers or categories, one value a row.</summary>
public abstract class Column(string name, int rows)
{
    /// <summary>Name of the variable, unique in its table (ordinal comparison).</summary>
    public string Name { get; } = name;

    /// <summary>Number of rows, missing ones included.</summary>
    public int Rows { get; } = rows;

    /// <summary>Whether the value at the zero-based <paramref name="row"/> is missing.</summary>
    public abstract bool IsMissing(int row);
}

/// <summary>
/// A column of numbers taken as written: value plus remainder is the decimal of the source to about 32 digits.
/// </summary>
/// <param name="name">Name of the variable.</param>
/// <param name="values">The numbers rounded to double; NaN where missing. Length = rows.</param>
/// <param name="remainders">What rounding took away (decimal − value), or null where every value is exact.</param>
public sealed class NumberColumn(string name, double[] values, double[]? remainders = null) : Column(name, values.Length)
{
    /// <summary>The numbers rounded to double; NaN where missing.</summary>
    public ReadOnlySpan<double> Values => values;

    /// <summary>Decimal − value for each row; empty where every value is exact.</summary>
    public ReadOnlySpan<double> Remainders => remainders;

    /// <inheritdoc/>
    public override bool IsMissing(int row) => double.IsNaN(values[row]);
}

/// <summary>A column of categories.</summary>
/// <param name="name">Name of the variable.</param>
/// <param name="codes">Zero-based index into <paramref name="categories"/> for each row; −1 where missing.</param>
/// <param name="categories">The categories in their order.</param>
/// <param name="reference">Index of the reference category.</param>
public sealed class CategoryColumn(string name, int[] codes, IReadOnlyList<string> categories, int reference = 0)
    : Column(name, codes.Length)
{
    /// <summary>Index of the category of each row; −1 where missing.</summary>
    public ReadOnlySpan<int> Codes => codes;

    /// <summary>The categories in their order.</summary>
    public IReadOnlyList<string> Categories { get; } = categories;

    /// <summary>Index of the reference category.</summary>
    public int Reference { get; } = reference;

    /// <inheritdoc/>
    public override bool IsMissing(int row) => codes[row] < 0;
}
