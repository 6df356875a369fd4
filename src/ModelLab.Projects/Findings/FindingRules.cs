using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Findings;

/// <summary>What a rule looks at: one revision with the data behind it.</summary>
/// <param name="RevisionId">Its id.</param>
/// <param name="Terms">The terms of its model.</param>
/// <param name="Figures">Its figures.</param>
/// <param name="Dictionary">The dictionary in force.</param>
public sealed record RevisionEvidence(string RevisionId, IReadOnlyList<Term> Terms, RevisionFigures Figures, DataDictionary Dictionary);

/// <summary>Something that a careful reviewer would look for. Pure: the same revision always gives the same findings.</summary>
public interface IFindingRule
{
    /// <summary>Stable name, stored with each finding.</summary>
    string Name { get; }

    /// <summary>Version of text and threshold.</summary>
    int Version { get; }

    /// <summary>Where the threshold comes from.</summary>
    string Source { get; }

    /// <summary>The findings at a revision.</summary>
    IEnumerable<FindingRecord> Look(RevisionEvidence evidence);
}

/// <summary>The rules in force.</summary>
public static class FindingRules
{
    /// <summary>All rules, in the order in which findings are raised.</summary>
    public static IReadOnlyList<IFindingRule> All { get; } = [new TiedPredictorsRule(), new CodedCategoryRule()];

    /// <summary>Name and version of each, as a revision records which rules looked at it.</summary>
    public static IReadOnlyList<string> Versions { get; } = [.. All.Select(VersionOf)];

    /// <summary>All findings at a revision.</summary>
    public static IReadOnlyList<FindingRecord> Look(RevisionEvidence evidence) => [.. All.SelectMany(r => r.Look(evidence))];

    /// <summary>Those of the rules that looked at a revision when it was made: a rule that came later says nothing about the record.</summary>
    public static IReadOnlyList<FindingRecord> LookAgain(RevisionEvidence evidence, IReadOnlyList<string> versions) =>
        [.. All.Where(r => versions.Contains(VersionOf(r), StringComparer.Ordinal)).SelectMany(r => r.Look(evidence))];

    private static string VersionOf(IFindingRule rule) => string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{rule.Name}/{rule.Version}");
}
