using ModelLab.Intake.Csv.Profiling;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>Puts what was noted of a column into its profile: figures, proposed kind, questions.</summary>
internal static class ColumnProposal
{
    /// <summary>The profile of a column.</summary>
    /// <param name="column">What was noted.</param>
    /// <param name="dialect">How the file is written.</param>
    /// <param name="markGiven">Whether a person stated the decimal mark.</param>
    internal static ColumnProfile Of(ColumnTally column, CsvDialect dialect, bool markGiven)
    {
        var own = DecimalMarkDecision.Own(column, dialect.DecimalMark);
        var numeric = DecimalMarkDecision.IsNumeric(column, dialect.DecimalMark);
        var view = new ColumnView(
            column,
            column.Distinct.Values(),
            numeric,
            numeric && column.Plain.Whole && own.Whole,
            numeric ? Math.Min(column.Plain.Minimum, own.Minimum) : null,
            numeric ? Math.Max(column.Plain.Maximum, own.Maximum) : null);

        var questions = new List<IntakeQuestion>();
        var kind = KindProposal.Of(view, questions);
        if (DirectIdentifiers.Ask(column, numeric) is { } identifier)
        {
            questions.Insert(0, identifier);
            kind = kind == VariableKind.Date ? kind : VariableKind.Identifier;
        }

        if (kind != VariableKind.Identifier && MissingCodeSuspicion.Ask(column, numeric, view.Values) is { } missing)
        {
            questions.Add(missing);
        }

        questions.AddRange(DecimalMarkDecision.Ask(column, dialect.DecimalMark, dialect.Delimiter, markGiven));
        questions.AddRange(TextQuestions.Ask(view));
        return new ColumnProfile(
            column.Name, kind, numeric, view.Whole, column.Missing, [.. column.MissingTexts], column.Distinct.Distinct, column.Distinct.Capped,
            view.Values, view.Minimum, view.Maximum, questions);
    }
}

/// <summary>A column as the proposals see it.</summary>
/// <param name="Tally">What was noted.</param>
/// <param name="Values">Distinct values with counts where few.</param>
/// <param name="Numeric">Whether all values are numbers.</param>
/// <param name="Whole">Whether all of them are whole.</param>
/// <param name="Minimum">Smallest number.</param>
/// <param name="Maximum">Largest number.</param>
internal sealed record ColumnView(ColumnTally Tally, IReadOnlyList<ValueCount> Values, bool Numeric, bool Whole, double? Minimum, double? Maximum)
{
    /// <summary>Whether no value came twice, as far as was counted.</summary>
    internal bool AllDistinct => !Tally.Distinct.AnyRepeated && Tally.Present > 1;
}
