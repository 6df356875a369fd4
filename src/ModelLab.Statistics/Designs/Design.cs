namespace ModelLab.Statistics.Designs;

/// <summary>What a model is made of, before any row is looked at.</summary>
/// <param name="Outcome">Name of the outcome, a numeric variable.</param>
/// <param name="Terms">The terms in their order, no two equal.</param>
/// <param name="Intercept">Whether the model has an intercept.</param>
public sealed record ModelSpecification(string Outcome, IReadOnlyList<Term> Terms, bool Intercept = true);

/// <summary>One column of a design matrix.</summary>
/// <param name="Term">The term that it belongs to; null for the intercept.</param>
/// <param name="CategoryIndex">Index of the category that a 0/1 column stands for, else null.</param>
/// <param name="Category">Name of that category, else null.</param>
public sealed record DesignColumn(Term? Term, int? CategoryIndex, string? Category)
{
    /// <summary>The column as people read it: <c>intercept</c>, its term, or <c>term [category]</c>.</summary>
    public string Text => Term is null ? "intercept" : Category is null ? Term.Text : $"{Term.Text} [{Category}]";
}

/// <summary>The design matrix and outcome of a model on chosen rows, in double-double.</summary>
/// <remarks>
/// <para>A numeric variable gives one column, a power one column formed in double-double from the decimals as written.</para>
/// <para>
/// A categorical variable gives a 0/1 column for every category that has rows among those analysed, except the reference. Categories
/// without rows have no column; where the column's reference is one of them, the first category with rows stands in for it. Both are
/// told by <see cref="Codings"/>.
/// </para>
/// <para>
/// Without intercept a categorical term keeps the same columns: the prediction at its reference with all numeric variables at zero is
/// then held at zero, and the choice of the reference matters. So whatever is compared, a model with or without a term is the same
/// set of columns with or without that term's.
/// </para>
/// <para>The matrix itself is not stored: runs of rows are formed when they are asked for.</para>
/// </remarks>
public sealed class Design
{
    private readonly ColumnForm[] forms;
    private readonly ColumnForm outcome;
    private readonly int[] rows;

    internal Design(
        ModelSpecification specification, int[] rows, ColumnForm outcome, ColumnForm[] forms,
        IReadOnlyList<DesignColumn> columns, IReadOnlyList<CategoryCoding> codings)
    {
        Specification = specification;
        Columns = columns;
        Codings = codings;
        this.rows = rows;
        this.outcome = outcome;
        this.forms = forms;
    }

    /// <summary>The specification that it was made from.</summary>
    public ModelSpecification Specification { get; }

    /// <summary>Number of rows analysed, n.</summary>
    public int Rows => rows.Length;

    /// <summary>The columns in their order, the intercept first where there is one.</summary>
    public IReadOnlyList<DesignColumn> Columns { get; }

    /// <summary>How each categorical term was coded, in the order of the terms.</summary>
    public IReadOnlyList<CategoryCoding> Codings { get; }

    /// <summary>The outcome is 2^OutcomeExponent times what <see cref="Fill"/> writes.</summary>
    internal int OutcomeExponent => outcome.Exponent;

    /// <summary>Forms the columns of a model.</summary>
    /// <param name="table">Where the variables are.</param>
    /// <param name="specification">Outcome, terms, intercept.</param>
    /// <param name="rows">Zero-based rows of the table to analyse, ascending; none may be missing in any variable of the model.</param>
    /// <exception cref="ModelRefusedException">The model cannot be formed on these rows; says why.</exception>
    /// <exception cref="ArgumentException">Two terms are equal, or the rows are not ascending rows of the table.</exception>
    public static Design Create(DataTable table, ModelSpecification specification, ReadOnlySpan<int> rows)
    {
        ArgumentNullException.ThrowIfNull(table);
        ArgumentNullException.ThrowIfNull(specification);
        return new DesignForming(table, specification, rows.ToArray()).Form();
    }

    /// <summary>A column is 2^exponent times what <see cref="Fill"/> writes.</summary>
    internal int Exponent(int column) => forms[column].Exponent;

    /// <summary>Writes <paramref name="count"/> rows from <paramref name="start"/> on, the outcome as the last column.</summary>
    internal void Fill(int start, int count, DesignBlock block)
    {
        var part = rows.AsSpan(start, count);
        for (var column = 0; column < forms.Length; column++)
        {
            forms[column].Fill(part, block.Hi(column), block.Lo(column));
        }

        outcome.Fill(part, block.Hi(forms.Length), block.Lo(forms.Length));
    }
}
