namespace ModelLab.Projects.Preparations;

/// <summary>Groups of categories that become the categories of a new variable.</summary>
/// <param name="Labels">Names of the new categories.</param>
/// <param name="Indexes">The categories of each, by index.</param>
/// <param name="Reference">Index of the new reference category.</param>
public sealed record CategoryGroups(IReadOnlyList<string> Labels, IReadOnlyList<IReadOnlyList<int>> Indexes, int Reference)
{
    /// <summary>Checks groups as asked for: every category in exactly one, every label once.</summary>
    /// <param name="request">The step.</param>
    /// <param name="categories">All categories of the variable.</param>
    /// <param name="present">Indexes of those that are not declared missing.</param>
    /// <exception cref="RefusedException">Says which group or category.</exception>
    public static CategoryGroups Of(StepRequest request, IReadOnlyList<string> categories, IReadOnlyList<int> present)
    {
        if (request.Groups is null || request.Groups.Count < 2 || request.Groups.Contains(null!))
        {
            throw RefusedException.Invalid("Give at least two groups, each with a label and its categories.", "groups");
        }

        var left = present.ToDictionary(i => categories[i], i => i, StringComparer.Ordinal);
        var known = string.Join(", ", left.Keys);
        var indexes = new List<IReadOnlyList<int>>();
        var labels = new List<string>();
        foreach (var group in request.Groups)
        {
            labels.Add(Reasons.Name(group.Label, "label"));
            indexes.Add(Take(group, left, known));
        }

        if (left.Count > 0)
        {
            throw RefusedException.Invalid($"A variable is collapsed as a whole: {string.Join(", ", left.Keys)} {(left.Count == 1 ? "is" : "are")} in no group.", "groups");
        }

        if (labels.Distinct(StringComparer.Ordinal).Count() != labels.Count)
        {
            throw RefusedException.Invalid("Two groups have the same label.", "groups");
        }

        var reference = request.Reference is null ? 0 : labels.IndexOf(request.Reference.Trim());
        return reference >= 0
            ? new CategoryGroups(labels, indexes, reference)
            : throw RefusedException.Invalid($"'{request.Reference}' is none of the labels: {string.Join(", ", labels)}.", "reference");
    }

    private static List<int> Take(GroupRequest group, Dictionary<string, int> left, string known)
    {
        if (group.Categories is null || group.Categories.Count == 0)
        {
            throw RefusedException.Invalid($"The group '{group.Label}' has no categories.", "groups");
        }

        var taken = new List<int>();
        foreach (var category in group.Categories)
        {
            taken.Add(category is not null && left.Remove(category, out var index)
                ? index
                : throw RefusedException.Invalid($"'{category}' is no category of the variable, or stands in two groups. The categories are: {known}.", "groups"));
        }

        return taken;
    }
}
