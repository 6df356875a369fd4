using System.Globalization;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>Questions about columns that would be numbers or tidy categories but for some cells. Places are named, texts of cells are not, since messages travel further than data.</summary>
internal static class TextQuestions
{
    /// <summary>The questions.</summary>
    internal static IEnumerable<IntakeQuestion> Ask(ColumnView view)
    {
        var column = view.Tally;
        if (view.Numeric || column.Texts == 0)
        {
            yield break;
        }

        if (column.MostlyNumbers && column.Dates.Iso + column.Dates.YearLast < column.Texts)
        {
            yield return new IntakeQuestion("numbers-with-texts", string.Create(CultureInfo.InvariantCulture,
                $"Most values are numbers, but {column.Texts + column.Grouped} of {column.Present} are not (first in row {column.FirstTextRow}), so the column is read as texts. Is it a number? Then correct these cells in the file, or name their text as a missing code."));
        }

        if (column.DistinctWithUnit > column.Distinct.Distinct / 2)
        {
            yield return new IntakeQuestion("number-with-unit", string.Create(CultureInfo.InvariantCulture,
                $"The values look like numbers with a unit or a sign (first in row {column.FirstTextRow}). Is it a number? Then write the figures alone in the file and keep the unit in the data dictionary."));
        }

        if (column.Spaced > 0)
        {
            yield return new IntakeQuestion("spaces-around", string.Create(CultureInfo.InvariantCulture,
                $"{column.Spaced} values begin or end with spaces (first in row {column.FirstSpacedRow}); they count as part of the text. Are they meant?"));
        }

        var variants = view.Values.GroupBy(v => v.Value.Trim().ToUpperInvariant(), StringComparer.Ordinal).Where(g => g.Count() > 1).ToArray();
        if (variants.Length > 0)
        {
            yield return new IntakeQuestion("spelling-variants", string.Create(CultureInfo.InvariantCulture,
                $"{variants.Sum(g => g.Count())} categories differ from another only in capitals or spaces. Are they the same? Then collapse them, or correct the file."));
        }
    }
}
