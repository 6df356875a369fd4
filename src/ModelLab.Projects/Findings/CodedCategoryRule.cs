using ModelLab.Intake;
using ModelLab.Projects.Entries;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Findings;

/// <summary>Codes of categories that a model averages as if they were measured.</summary>
public sealed class CodedCategoryRule : IFindingRule
{
    private static readonly string[] CodeWords = ["code", "type", "group", "class", "category", "cat", "band", "grade", "status", "region"];

    /// <inheritdoc/>
    public string Name => "coded-category";

    /// <inheritdoc/>
    public int Version => 1;

    /// <inheritdoc/>
    public string Source => "whole numbers with at most ten distinct values that nobody confirmed as measured, or named as a code; common practice";

    /// <inheritdoc/>
    public IEnumerable<FindingRecord> Look(RevisionEvidence evidence)
    {
        foreach (var name in evidence.Terms.SelectMany(t => t.Variables).Distinct(StringComparer.Ordinal))
        {
            if (evidence.Dictionary.Find(name) is not { Kind: VariableKind.Continuous } variable || !variable.Questions.Contains("codes-or-counts", StringComparer.Ordinal))
            {
                continue;
            }

            var namedAsCode = name.Split('_', ' ', '-', '.').Any(w => CodeWords.Contains(w, StringComparer.OrdinalIgnoreCase));
            if (variable.Confirmed && !namedAsCode)
            {
                continue;
            }

            yield return new FindingRecord(
                Name,
                Version,
                new Place("term", evidence.RevisionId, new VariableTerm(name).Text),
                FindingWeight.Serious,
                [name],
                $"{name} enters as a number, but its {variable.Distinct} distinct whole values look like codes of categories"
                + (namedAsCode ? " and its name says so." : ", and nobody confirmed that it is measured."),
                "A slope over codes assumes that they are in order and equally spaced. If they name categories, describe the variable as categorical; if they count or score something, confirm it as continuous with a reason.");
        }
    }
}
