using System.Globalization;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>
/// Whole numbers with few distinct values may be codes of categories, counts or scores; the figures alone cannot tell. The rule
/// (thresholds: common practice): three to ten distinct whole numbers, none negative, within a range of twenty, each met twice on the
/// average, are questioned. A word of the name that speaks of codes (type, group) or of a count or measure (rooms, score) decides the
/// proposal; where none does, or both, they are proposed as categories if they run from 0 or 1 without a gap, else as a number. Codes are so never averaged unasked, and rooms
/// (2 to 9) are no categories.
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

    /// <summary>Whether the question is to be asked.</summary>
    internal static bool Applies(IReadOnlyList<ValueCount> values, bool whole, double minimum, double maximum) =>
        whole && values.Count is >= FewestValues and <= MostValues && minimum >= 0 && maximum - minimum <= WidestRange
        && values.Sum(v => v.Count) >= 2L * values.Count;

    /// <summary>The kind proposed where the question is asked.</summary>
    internal static VariableKind Proposal(string name, IReadOnlyList<ValueCount> values, double minimum, double maximum)
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

    /// <summary>The question.</summary>
    internal static IntakeQuestion Question(IReadOnlyList<ValueCount> values, VariableKind proposal) => new(
        "codes-or-counts",
        string.Create(CultureInfo.InvariantCulture, $"The column holds only {values.Count} different whole numbers. Are they codes of categories (then each gets its own estimate), or a count or score (then one unit more means the same everywhere)? ")
        + (proposal == VariableKind.Categorical ? "Until someone says, they are taken as categories." : "Until someone says, they are taken as a number."));
}
