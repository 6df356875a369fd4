using System.Globalization;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>
/// Proposes the kind of a variable, and asks wherever the figures leave more than one reading. A person decides. Thresholds are common practice.
/// </summary>
internal static class KindProposal
{
    /// <summary>Most categories that raise no question.</summary>
    internal const int ManyCategories = 50;

    private const double SmallestNumberLikeKey = 100_000;

    private static readonly string[] IdentifierWords =
        ["id", "ids", "identifier", "ident", "uuid", "guid", "key", "serial", "serial number", "record", "record number", "case number", "case no", "row", "row number", "reference", "ref", "participant", "subject", "respondent"];

    private static readonly string[] TimeWords = ["year", "years", "month", "week", "day", "quarter", "period", "time", "t", "wave", "order", "date", "hour"];

    /// <summary>The kind proposed; questions are added.</summary>
    internal static VariableKind Of(ColumnView view, List<IntakeQuestion> questions)
    {
        var column = view.Tally;
        if (column.Present == 0)
        {
            questions.Add(new IntakeQuestion("empty-column", "The column holds no value at all. Is it needed?"));
            return VariableKind.Categorical;
        }

        if (OfDates(view, questions) is { } date)
        {
            return date;
        }

        if (column.Distinct.Distinct == 1)
        {
            questions.Add(new IntakeQuestion("constant", "All values are the same: the column tells no row from another and cannot enter a model. Is it needed?"));
            return view.Numeric ? VariableKind.Continuous : VariableKind.Categorical;
        }

        if (column.Distinct.Distinct == 2 && column.Distinct.AnyRepeated)
        {
            if (view.Numeric && view.Maximum - view.Minimum != 1)
            {
                questions.Add(new IntakeQuestion("two-values", "The column holds only two different numbers, and not two neighbouring whole ones as codes are. Are they two groups, or a measure taken at two points?"));
            }

            return VariableKind.Binary;
        }

        return view.Numeric ? OfNumbers(view, questions) : OfTexts(view, questions);
    }

    private static VariableKind? OfDates(ColumnView view, List<IntakeQuestion> questions)
    {
        var dates = view.Tally.Dates;
        var present = view.Tally.Present;
        if (dates.Iso == present)
        {
            return VariableKind.Date;
        }

        if (dates.Compact == present && view.Whole && view.Tally.Distinct.Distinct > 2)
        {
            questions.Add(new IntakeQuestion("date-compact", "The numbers read as dates written YYYYMMDD. Are they dates?"));
            return VariableKind.Date;
        }

        if (dates.Iso + dates.YearLast != present || dates.YearLast == 0)
        {
            return null;
        }

        questions.Add((dates.DayFirst, dates.MonthFirst) switch
        {
            (true, false) when dates.Iso == 0 => new IntakeQuestion("date-order", "The dates are read as day, month, year, since a first part above 12 occurs. Is that right?"),
            (false, true) when dates.Iso == 0 => new IntakeQuestion("date-order", "The dates are read as month, day, year, since a second part above 12 occurs. Is that right?"),
            (false, false) when dates.Iso == 0 => new IntakeQuestion("date-ambiguous", "Nothing in the column tells whether the day or the month comes first. Which is it? Dates written YYYY-MM-DD need no question."),
            _ => new IntakeQuestion("date-mixed", "The column writes dates in more than one way. Write all of them as YYYY-MM-DD in the file."),
        });
        return VariableKind.Date;
    }

    private static VariableKind OfNumbers(ColumnView view, List<IntakeQuestion> questions)
    {
        var column = view.Tally;
        var words = new HeaderWords(column.Name);
        if (column.LeadingZeros > 0 && view.Whole)
        {
            questions.Add(new IntakeQuestion("leading-zeros", "Some numbers are written with zeros before them, as codes are (007). Are they codes? As numbers the zeros would be lost."));
            return view.AllDistinct ? VariableKind.Identifier : VariableKind.Categorical;
        }

        if (view.Whole && words.HasAny(IdentifierWords))
        {
            questions.Add(IdentifierQuestion(view, "By its name"));
            return VariableKind.Identifier;
        }

        if (view.Whole && column.Sequence.Runs && column.Sequence.Count == column.Present)
        {
            if (column.Sequence.First is 0 or 1 && !words.HasAny(TimeWords))
            {
                questions.Add(IdentifierQuestion(view, "Counting upwards from row to row"));
                return VariableKind.Identifier;
            }

            questions.Add(new IntakeQuestion("sequence", "The numbers count upwards by one from row to row. Are they a measure such as a year (it may enter a model; the rows then have an order), or only names of the rows?"));
            return VariableKind.Continuous;
        }

        if (CodesOrCounts.Ask(view) is { } codes)
        {
            questions.Add(codes.Question);
            return codes.Kind;
        }

        if (view.Whole && view.AllDistinct && view.Minimum >= SmallestNumberLikeKey && column.Present > ManyCategories)
        {
            questions.Add(IdentifierQuestion(view, "With large whole numbers that never repeat"));
        }

        return VariableKind.Continuous;
    }

    private static VariableKind OfTexts(ColumnView view, List<IntakeQuestion> questions)
    {
        var column = view.Tally;
        if (column.MostlyNumbers)
        {
            // a measure with a few stray texts, which TextQuestions asks about
            return VariableKind.Categorical;
        }

        if (view.AllDistinct)
        {
            questions.Add(IdentifierQuestion(view, "With texts that never repeat"));
            return VariableKind.Identifier;
        }

        if (new HeaderWords(column.Name).HasAny(IdentifierWords) && column.Distinct.Distinct > ManyCategories)
        {
            questions.Add(IdentifierQuestion(view, "By its name"));
            return VariableKind.Identifier;
        }

        if (ScaleWords.LookOrdered([.. view.Values.Select(v => v.Value)]))
        {
            questions.Add(new IntakeQuestion("ordered-perhaps", "The categories seem to have an order. Do they? Then give it: the alphabet would put it wrong."));
        }

        if (column.Distinct.Distinct > ManyCategories)
        {
            questions.Add(new IntakeQuestion("many-categories", string.Create(CultureInfo.InvariantCulture,
                $"The column holds {(column.Distinct.Capped ? "more than " : string.Empty)}{column.Distinct.Distinct} different texts. Are they categories (each costs a degree of freedom; collapse them before use), or do they name units?")));
        }

        return VariableKind.Categorical;
    }

    private static IntakeQuestion IdentifierQuestion(ColumnView view, string why) => view.Tally.Distinct.AnyRepeated
        ? new IntakeQuestion("repeated-identifier", $"{why}, the column seems to name units, and some come in several rows. Are rows of one unit repeated measurements or members of a group? Then they are not independent, and it can serve as the cluster.")
        : new IntakeQuestion("identifier-perhaps", $"{why}, the column seems to name the rows. Is it an identifier? Then it never enters a model.");
}
