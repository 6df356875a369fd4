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
public sealed record DesignColumn(Term? Term, int? CategoryIndex, string? Category);

/// <summary>The design matrix and outcome of a model on chosen rows, in double-double.</summary>
public sealed class Design
{
    /// <summary>Forms the columns of a model.</summary>
    /// <param name="table">Where the variables are.</param>
    /// <param name="specification">Outcome, terms, intercept.</param>
    /// <param name="rows">Zero-based rows of the table to analyse, ascending; none may be missing in any variable of the model.</param>
    /// <exception cref="ModelRefusedException">The model cannot be formed on these rows; says why.</exception>
    public static Design Create(DataTable table, ModelSpecification specification, ReadOnlySpan<int> rows) => throw new NotImplementedException();

    /// <summary>The specification that it was made from.</summary>
    public ModelSpecification Specification => throw new NotImplementedException();

    /// <summary>Number of rows analysed, n.</summary>
    public int Rows => throw new NotImplementedException();

    /// <summary>The columns in their order, the intercept first where there is one.</summary>
    public IReadOnlyList<DesignColumn> Columns => throw new NotImplementedException();
}
