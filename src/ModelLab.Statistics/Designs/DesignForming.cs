using System.Globalization;

namespace ModelLab.Statistics.Designs;

/// <summary>Checks a model against a table and forms the columns of its design.</summary>
internal sealed class DesignForming(DataTable table, ModelSpecification specification, int[] rows)
{
    // Squares and products of outcome and predictors then stay within the range of double.
    private const int LargestExponent = 498;

    private readonly List<DesignColumn> columns = [];
    private readonly List<ColumnForm> forms = [];
    private readonly List<CategoryCoding> codings = [];

    public Design Form()
    {
        CheckArguments();
        var outcome = FormOutcome();
        CheckRows(specification.Terms.Count + (specification.Intercept ? 1 : 0)); // at least so many: said before a short column seems constant
        if (specification.Intercept)
        {
            Add(new InterceptForm(), new DesignColumn(null, null, null));
        }

        foreach (var term in specification.Terms)
        {
            FormTerm(term);
        }

        if (forms.Count == 0)
        {
            throw new ModelRefusedException(
                ModelRefusal.NothingToFit,
                $"The model of '{specification.Outcome}' has neither an intercept nor a term. Put at least one in.");
        }

        CheckRows(forms.Count);
        return new Design(specification, rows, outcome, [.. forms], columns, codings);
    }

    private void CheckRows(int coefficients)
    {
        if (rows.Length <= coefficients)
        {
            throw new ModelRefusedException(
                ModelRefusal.TooFewRows,
                $"The model of '{specification.Outcome}' has {coefficients} or more coefficients on {rows.Length} analysed rows, so nothing is left to judge the fit by. " +
                "Take terms out, or analyse more rows.");
        }
    }

    private void CheckArguments()
    {
        if (specification.Terms.Distinct().Count() != specification.Terms.Count)
        {
            throw new ArgumentException("Two terms of the model are equal.");
        }

        for (var i = 0; i < rows.Length; i++)
        {
            if (rows[i] < 0 || rows[i] >= table.Rows || (i > 0 && rows[i] <= rows[i - 1]))
            {
                throw new ArgumentException("The rows to analyse must be ascending rows of the table.");
            }
        }
    }

    private NumberForm FormOutcome()
    {
        var name = specification.Outcome;
        if (Find(name) is not NumberColumn column)
        {
            throw new ModelRefusedException(
                ModelRefusal.OutcomeNotNumeric,
                $"The outcome '{name}' is categorical. Least squares needs a numeric outcome: choose another one.",
                [name]);
        }

        if (specification.Terms.FirstOrDefault(term => term.Variables.Contains(name, StringComparer.Ordinal)) is { } own)
        {
            throw new ModelRefusedException(
                ModelRefusal.OutcomeAmongTerms,
                $"The outcome '{name}' is also used in the term '{own.Text}'. Take that term out.",
                [name]);
        }

        CheckPresent(column);
        if (rows.Length > 1 && IsConstant(column))
        {
            throw new ModelRefusedException(
                ModelRefusal.OutcomeConstant,
                $"The outcome '{name}' has one value in all {rows.Length} analysed rows, so there is nothing to explain. Analyse other rows, or choose another outcome.",
                [name]);
        }

        return FormNumber(column, 1, name);
    }

    private void FormTerm(Term term)
    {
        var column = Find(term.Variables[0]);
        CheckPresent(column);
        switch (term, column)
        {
            case (VariableTerm, NumberColumn number):
                CheckVaries(number);
                Add(FormNumber(number, 1, term.Text), new DesignColumn(term, null, null));
                break;
            case (PowerTerm power, NumberColumn number):
                CheckVaries(number);
                Add(FormNumber(number, power.Degree, term.Text), new DesignColumn(term, null, null));
                break;
            case (VariableTerm, CategoryColumn category):
                FormCategories(term, category);
                break;
            case (PowerTerm, CategoryColumn category):
                throw new ModelRefusedException(
                    ModelRefusal.TermNotNumeric,
                    $"'{term.Text}' is a power of '{category.Name}', which is categorical. Use the variable itself as a term.",
                    [category.Name]);
            default:
                throw new ArgumentException($"The term '{term.Text}' is of no kind that a design can form.");
        }
    }

    private void FormCategories(Term term, CategoryColumn column)
    {
        var present = new bool[column.Categories.Count];
        foreach (var row in rows)
        {
            present[column.Codes[row]] = true;
        }

        if (rows.Length > 0 && present.Count(has => has) < 2)
        {
            throw Constant(column.Name, $"the category '{column.Categories[Array.IndexOf(present, true)]}'");
        }

        var replaced = rows.Length > 0 && !present[column.Reference];
        var reference = replaced ? Array.IndexOf(present, true) : column.Reference;
        for (var category = 0; category < present.Length; category++)
        {
            if (present[category] && category != reference)
            {
                Add(new IndicatorForm(column, category), new DesignColumn(term, category, column.Categories[category]));
            }
        }

        var leftOut = column.Categories.Where((_, category) => !present[category]).ToArray();
        codings.Add(new CategoryCoding(term, reference, column.Categories[reference], replaced, leftOut));
    }

    private NumberForm FormNumber(NumberColumn column, int degree, string text)
    {
        var largest = 0.0;
        var values = column.Values;
        foreach (var row in rows)
        {
            largest = Math.Max(largest, Math.Abs(values[row]));
        }

        var exponent = largest == 0.0 ? 0 : Math.ILogB(largest);
        if (Math.Abs(exponent * degree) > LargestExponent)
        {
            throw new ModelRefusedException(
                ModelRefusal.ValueOutOfRange,
                string.Create(CultureInfo.InvariantCulture, $"The values of '{text}' reach magnitudes of about 10^{exponent * degree * 0.30103:F0}, beyond what can be computed with. Give '{column.Name}' in another unit."),
                [column.Name]);
        }

        return new NumberForm(column, exponent, degree);
    }

    private void CheckPresent(Column column)
    {
        if (column is NumberColumn number)
        {
            var values = number.Values;
            foreach (var row in rows)
            {
                if (!double.IsFinite(values[row]))
                {
                    throw Unusable(column, row, double.IsNaN(values[row]));
                }
            }

            return;
        }

        foreach (var row in rows)
        {
            if (column.IsMissing(row))
            {
                throw Unusable(column, row, true);
            }
        }
    }

    private static ModelRefusedException Unusable(Column column, int row, bool missing) => new(
        ModelRefusal.ValueMissing,
        missing
            ? $"'{column.Name}' is missing in row {row + 1}. Leave that row out of the rows analysed, or fill the value in."
            : $"'{column.Name}' is infinite in row {row + 1}. Correct the value, or leave that row out of the rows analysed.",
        [column.Name]);

    private void CheckVaries(NumberColumn column)
    {
        if (rows.Length > 0 && IsConstant(column))
        {
            throw Constant(column.Name, string.Create(CultureInfo.InvariantCulture, $"the value {column.Values[rows[0]]}"));
        }
    }

    private bool IsConstant(NumberColumn column)
    {
        var values = column.Values;
        var remainders = column.Remainders;
        foreach (var row in rows)
        {
            if (values[row] != values[rows[0]] || (!remainders.IsEmpty && remainders[row] != remainders[rows[0]]))
            {
                return false;
            }
        }

        return true;
    }

    private ModelRefusedException Constant(string variable, string what) => new(
        ModelRefusal.PredictorConstant,
        $"'{variable}' has {what} in all {rows.Length} analysed rows, so its effect cannot be told apart. Take its terms out, or analyse other rows.",
        [variable]);

    private Column Find(string name) => table.Find(name) ?? throw new ModelRefusedException(
        ModelRefusal.UnknownVariable,
        $"The table has no variable '{name}'. Its variables are: {string.Join(", ", table.Columns.Select(column => column.Name))}.",
        [name]);

    private void Add(ColumnForm form, DesignColumn column)
    {
        forms.Add(form);
        columns.Add(column);
    }
}
