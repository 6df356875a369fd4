using System.Globalization;
using ModelLab.Intake.Csv.Proposals;

namespace ModelLab.Intake.Csv.Profiling;

/// <summary>
/// Decides the decimal mark of a file from all its rows, and refuses numbers that no mark explains. Only columns that hold nothing but
/// numbers speak, and first those with a mark that cannot separate thousands. The mark that more columns need decides; the columns of the
/// other mark are then read as texts and questioned. One column with both marks, and thousands marks, are refused: a guess there would change a figure a thousandfold.
/// </summary>
internal static class DecimalMarkDecision
{
    /// <summary>The decimal mark.</summary>
    /// <param name="columns">What was noted of the columns.</param>
    /// <param name="given">The mark where a person knows it.</param>
    /// <param name="delimiter">Between cells.</param>
    internal static char Decide(IReadOnlyList<ColumnTally> columns, char? given, char delimiter)
    {
        if (given is { } mark)
        {
            return mark;
        }

        var numbers = columns.Where(c => c.Texts == 0 && c.Grouped == 0).ToArray();
        var point = numbers.Where(c => c.Point.Count > 0 && c.Comma.Count == 0).ToArray();
        var comma = numbers.Where(c => c.Comma.Count > 0 && c.Point.Count == 0).ToArray();
        var surePoint = point.Count(c => c.Point.GroupLike < c.Point.Count);
        var sureComma = comma.Count(c => c.Comma.GroupLike < c.Comma.Count);
        if (surePoint != sureComma)
        {
            return sureComma > surePoint ? ',' : '.';
        }

        // semicolons stand between cells where the comma is the decimal mark; commas that could all separate thousands are decimals only there
        return comma.Length > 0 && (surePoint > 0 ? delimiter == ';' : point.Length == 0 && delimiter != ',') ? ',' : '.';
    }

    /// <summary>The numbers of a column that carry the decimal mark of the file.</summary>
    internal static NumberTally Own(ColumnTally column, char mark) => mark == '.' ? column.Point : column.Comma;

    /// <summary>The numbers of a column that carry the other mark.</summary>
    internal static NumberTally Other(ColumnTally column, char mark) => mark == '.' ? column.Comma : column.Point;

    /// <summary>Whether all values of a column are numbers under the mark.</summary>
    internal static bool IsNumeric(ColumnTally column, char mark) =>
        column.Present > 0 && column.Texts == 0 && column.Grouped == 0 && Other(column, mark).Count == 0;

    /// <summary>Tells what cannot be read as a number without a guess.</summary>
    internal static void Check(ColumnTally column, char mark, ProblemList problems)
    {
        // house numbers, telephone numbers and the like have separators of their own
        if (column.Texts > 0 || DirectIdentifiers.NamedSo(column.Name))
        {
            return;
        }

        var own = Own(column, mark);
        var other = Other(column, mark);
        if (column.Grouped > 0)
        {
            problems.Add(column.FirstGroupedRow, column.Name, string.Create(CultureInfo.InvariantCulture,
                $"The number is written with thousands marks ({column.Grouped} cells of this column are). Write numbers without them, 1234567.8 for example."));
        }
        else if (other.Count > 0 && other.GroupLike == other.Count)
        {
            problems.Add(other.FirstRow, column.Name, string.Create(CultureInfo.InvariantCulture,
                $"The number has a {NameOf(mark == '.' ? ',' : '.')} before its last three digits where decimals are written with a {NameOf(mark)}: a thousands mark, it seems ({other.Count} cells of this column). Write numbers without thousands marks, or state the decimal mark."));
        }
        else if (other.Count > 0 && own.Count > 0)
        {
            problems.Add(other.FirstRow, column.Name, string.Create(CultureInfo.InvariantCulture,
                $"The column writes decimals with a {NameOf(mark)} (first in row {own.FirstRow}) and with a {NameOf(mark == '.' ? ',' : '.')} ({other.Count} cells, first in this row). Write all decimals with one mark."));
        }
    }

    /// <summary>Questions that the marks of a column raise.</summary>
    internal static IEnumerable<IntakeQuestion> Ask(ColumnTally column, char mark, char delimiter, bool markGiven)
    {
        var own = Own(column, mark);
        var other = Other(column, mark);
        if (column.Texts == 0 && other.Count > 0)
        {
            yield return new IntakeQuestion("decimal-mark-mixed", string.Create(CultureInfo.InvariantCulture,
                $"This column writes decimals with a {NameOf(mark == '.' ? ',' : '.')} (first in row {other.FirstRow}), other columns with a {NameOf(mark)}. It is read as texts. Are these numbers? Then write them with a {NameOf(mark)} in the file."));
        }

        if (!markGiven && IsNumeric(column, mark) && own.Count > 0 && own.GroupLike == own.Count && (mark == ',' || delimiter == ';'))
        {
            yield return new IntakeQuestion("thousands-or-decimals", string.Create(CultureInfo.InvariantCulture,
                $"Every {NameOf(mark)} in this column stands before three last digits (first in row {own.FirstRow}). It is read as the decimal mark. Does it separate thousands instead? Then write the numbers without it."));
        }
    }

    private static string NameOf(char mark) => mark == '.' ? "point" : "comma";
}
