using System.Globalization;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>
/// Whole numbers with few distinct values may be codes of categories, counts or scores; the figures alone cannot tell. The rule
/// (thresholds: common practice): three to ten distinct whole numbers, none negative, within a range of twenty, each met twice on the
/// average, are questioned. A word of the name that speaks of codes (type, group) or of a count or measure (rooms, score) decides the
/// proposal; where none does, or both, they are proposed as categories if they run from 0 or 1 without a gap, else as a number. Codes are so never averaged unasked, and rooms
/// (2 to 9) are no categories. A number that is suspected to stand for missing (99 beside 1 to 5) is left aside: it would hide the codes.
/// </summary>
internal static class CodesOrCounts
{
    private const int FewestValues = 3;
    private const int MostValues = 10;
    private const double WidestRange = 20;

    private static readonly string[] CodeWords =
    [
        "code", "codes", "coded", "type", "kind", "class", "category", "cat", "group", "grp", "region", "district", "area code", "zone", "ward", "site", "centre", "center", "clinic", "school",
        "status", "stratum", "strata", "cluster", "sector", "arm", "treatment", "condition", "method", "tenure", "race", "ethnicity", "religion", "occupation", "department", "brand", "model", "batch", "block", "gender", "sex",
    ];

    private static readonly string[] CountWords =
    [
        "n", "num", "number", "count", "counts", "no of", "number of", "rooms", "bedrooms", "bathrooms", "occupants", "persons", "people", "children", "kids", "siblings", "adults", "members", "household size", "size", "visits",
        "events", "episodes", "days", "weeks", "months", "years", "year", "hours", "minutes", "age", "score", "points", "total", "sum", "dose", "floors", "storeys", "cars", "vehicles", "cylinders", "doors", "seats", "items", "pieces",
        "kg", "g", "m", "cm", "mm", "km", "m2", "c", "kwh", "mwh", "percent", "pct", "rate", "time", "length", "width", "height", "depth", "weight", "distance", "temperature", "amount", "quantity",
    ];

    /// <summary>The question and the kind proposed, or null where nothing is to be asked.</summary>
    internal static CodesQuestion? Ask(ColumnView view)
    {
        if (!view.Whole)
        {
            return null;
        }

        var apart = view.Tally.Suspects.Apart();
        List<ValueCount> values = [.. view.Values.Where(v => !apart.Contains(v.Value, StringComparer.Ordinal))];
        var minimum = view.Minimum!.Value;
        var maximum = view.Maximum!.Value;
        if (values.Count < view.Values.Count)
        {
            // The range is taken anew without them. A text that is not read here ("5,0") leaves the column as it is.
            List<double> numbers = [.. values.Select(v => double.TryParse(v.Value, NumberStyles.Float, CultureInfo.InvariantCulture, out var number) ? number : double.NaN)];
            if (numbers.Count == 0 || numbers.Exists(double.IsNaN))
            {
                values = [.. view.Values];
            }
            else
            {
                minimum = numbers.Min();
                maximum = numbers.Max();
            }
        }

        if (!Applies(values, minimum, maximum))
        {
            return null;
        }

        var kind = Proposal(view.Tally.Name, values, minimum, maximum);
        return new CodesQuestion(kind, Question(values.Count, values.Count < view.Values.Count ? apart : [], kind));
    }

    private static bool Applies(List<ValueCount> values, double minimum, double maximum) =>
        values.Count is >= FewestValues and <= MostValues && minimum >= 0 && maximum - minimum <= WidestRange
        && values.Sum(v => v.Count) >= 2L * values.Count;

    private static VariableKind Proposal(string name, List<ValueCount> values, double minimum, double maximum)
    {
        var words = new HeaderWords(name);
        var namedCode = words.HasAny(CodeWords);
        var namedCount = words.HasAny(CountWords);
        if (namedCode != namedCount)
        {
            return namedCode ? VariableKind.Categorical : VariableKind.Continuous;
        }

        return minimum is 0 or 1 && maximum - minimum + 1 == values.Count ? VariableKind.Categorical : VariableKind.Continuous;
    }

    private static IntakeQuestion Question(int values, IReadOnlyList<string> besides, VariableKind proposal) => new(
        "codes-or-counts",
        (besides.Count == 0 ? "The column holds" : $"Besides {string.Join(" and ", besides)} the column holds")
        + string.Create(CultureInfo.InvariantCulture, $" only {values} different whole numbers. Are they codes of categories (then each gets its own estimate), or a count or score (then one unit more means the same everywhere)? ")
        + (proposal == VariableKind.Categorical ? "Until someone says, they are taken as categories." : "Until someone says, they are taken as a number."));
}

/// <summary>A question whether numbers are codes, with the kind proposed until it is answered.</summary>
/// <param name="Kind">The kind.</param>
/// <param name="Question">The question.</param>
internal sealed record CodesQuestion(VariableKind Kind, IntakeQuestion Question);
