using System.Globalization;
using System.Text;
using ModelLab.Intake.Csv.Reading;

namespace ModelLab.Intake.Csv;

/// <summary>The names of the columns: trimmed, present, distinct.</summary>
internal static class HeaderRow
{
    /// <summary>Checks header cells and gives the names.</summary>
    /// <param name="cells">The cells as read.</param>
    /// <param name="problems">Where problems are told; names that have one are placeholders.</param>
    /// <exception cref="IntakeRefusedException">All cells are numbers or missing: there is no header.</exception>
    internal static IReadOnlyList<string> Names(IReadOnlyList<string> cells, ProblemList problems)
    {
        var names = cells.Select(Clean).ToArray();
        if (names.All(LooksLikeData))
        {
            throw problems.Refusal(0, null,
                "The first row holds only numbers, so the columns have no names. Write a row of names above it; where these are the names (years, say), let them begin with a letter.");
        }

        var first = new Dictionary<string, int>(StringComparer.Ordinal);
        for (var i = 0; i < names.Length; i++)
        {
            var number = (i + 1).ToString(CultureInfo.InvariantCulture);
            if (names[i].Length == 0)
            {
                problems.Add(0, number,
                    $"Column {number} has no name. Name it in the first row, or, where every row ends with a spare delimiter, remove that.");
            }
            else if (names[i].Length > IntakeLimits.NameCharacters)
            {
                problems.Add(0, number,
                    string.Create(CultureInfo.InvariantCulture, $"The name of column {number} is longer than {IntakeLimits.NameCharacters} characters. Shorten it; a description can be kept as its label."));
            }
            else if (!first.TryAdd(names[i], i))
            {
                problems.Add(0, names[i],
                    string.Create(CultureInfo.InvariantCulture, $"Columns {first[names[i]] + 1} and {number} are both named '{names[i]}'. Give each column a name of its own."));
            }
        }

        return names;
    }

    /// <summary>Trims a name and turns line breaks and control characters inside into single spaces.</summary>
    private static string Clean(string cell)
    {
        var name = new StringBuilder(Math.Min(cell.Length, 64));
        foreach (var c in cell.Trim())
        {
            if (!char.IsControl(c))
            {
                name.Append(c);
            }
            else if (name.Length > 0 && name[^1] != ' ')
            {
                name.Append(' ');
            }
        }

        return name.ToString();
    }

    private static bool LooksLikeData(string name)
    {
        var utf8 = Encoding.UTF8.GetBytes(name);
        return CellShape.Of(utf8).IsNumber || MissingTexts.IsMissing(utf8);
    }
}
