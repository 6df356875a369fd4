using ModelLab.Intake.Csv.Profiling;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>Questions values that may stand for missing but are not taken so unasked: numbers apart from the others, and words.</summary>
internal static class MissingCodeSuspicion
{
    private static readonly HashSet<string> Words = new(StringComparer.OrdinalIgnoreCase)
    {
        "missing", "unknown", "not known", "not available", "not applicable", "not recorded", "not stated", "no answer", "no data", "none", "nil", "refused", "don't know", "dont know", "dk",
        "undefined", "#n/a", "#na", "#value!", "#div/0!", "#ref!", "#name?", "#null!", "#num!", "--", "---", "..", "*", "inf", "-inf", "infinity", "9999-99-99", "0000-00-00",
    };

    /// <summary>The question, or null.</summary>
    internal static IntakeQuestion? Ask(ColumnTally column, bool numeric, IReadOnlyList<ValueCount> values)
    {
        var suspects = numeric
            ? column.Suspects.Apart()
            : [.. values.Select(v => v.Value).Where(v => Words.Contains(v.Trim()))];
        if (!numeric && column.MostlyNumbers)
        {
            suspects = [.. suspects, .. column.Suspects.Apart()];
        }

        return suspects.Count == 0 ? null : new IntakeQuestion(
            "missing-code-suspected",
            $"Does {string.Join(" or ", suspects.Select(s => $"'{s}'"))} stand for a missing value here? It is read as a value until it is named as a missing code.");
    }
}
