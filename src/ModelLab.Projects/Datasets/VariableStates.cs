using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Numerics;

namespace ModelLab.Projects.Datasets;

/// <summary>A change to a variable's description; what is null stays as it is, an empty text clears it.</summary>
/// <param name="Label">Long name for people.</param>
/// <param name="Unit">Unit of measurement.</param>
/// <param name="Kind">Kind.</param>
/// <param name="MissingCodes">All texts that mean missing, besides the empty cell.</param>
/// <param name="ReferenceCategory">Category against which the others are read; cleared: the first.</param>
/// <param name="Note">Anything a reader should know.</param>
/// <param name="Reason">Why.</param>
public sealed record VariableChange(
    string? Label, string? Unit, VariableKind? Kind, IReadOnlyList<string>? MissingCodes, string? ReferenceCategory, string? Note, string? Reason);

/// <summary>Forms the description of a variable from what was seen of it and from what people say.</summary>
public sealed class VariableStates(DatasetColumns columns)
{
    /// <summary>The program's proposal for a column.</summary>
    public static VariableState Propose(string id, ColumnProfile column) => new(
        id, column.Name, null, null, column.ProposedKind, false, column.Numeric, column.Missing, column.Distinct,
        [.. column.MissingCodes.Where(c => c.Length > 0)], null, null, [.. column.Questions.Select(q => q.Code)]);

    /// <summary>The state of a variable as a record of an entry.</summary>
    public static VariableState Of(VariableView v) => new(
        v.VariableId, v.Name, v.Label, v.Unit, v.Kind, v.Confirmed, v.Numeric, v.Missing, v.Distinct, v.MissingCodes, v.ReferenceCategory, v.Note, v.Questions);

    /// <summary>Applies a change. Missing codes are counted anew in the source.</summary>
    /// <exception cref="RefusedException">The variable cannot be what it is said to be; names rows.</exception>
    public async Task<VariableState> ApplyAsync(
        string projectId, SourceView source, SourceContents contents, VariableState before, VariableChange change, CancellationToken cancellation)
    {
        var state = before with
        {
            Label = Cleared(change.Label, before.Label, "label"),
            Unit = Cleared(change.Unit, before.Unit, "unit"),
            Note = Cleared(change.Note, before.Note, "note"),
            Kind = change.Kind ?? before.Kind,

            // Naming the kind confirms it, and so does sending nothing but a reason; describing something else does not.
            Confirmed = before.Confirmed || change.Kind is not null || change is { Label: null, Unit: null, Note: null, MissingCodes: null, ReferenceCategory: null },
        };
        if (change.MissingCodes is not null)
        {
            state = await CountedAsync(projectId, source, contents, state with { MissingCodes = Codes(change.MissingCodes) }, cancellation);
        }

        if (change.ReferenceCategory is not null)
        {
            if (change.ReferenceCategory.Length > 0 && !HasCategories(state.Kind))
            {
                throw RefusedException.Invalid(
                    $"Only binary, categorical and ordered variables have a reference category, and '{state.Name}' is none of them. Send the kind with it, or leave it out. Nothing was stored.",
                    "referenceCategory");
            }

            state = state with { ReferenceCategory = change.ReferenceCategory.Length == 0 ? null : IndexOf(state, contents, change.ReferenceCategory) };
        }

        await RequireKindAsync(projectId, source, contents, state, cancellation);
        return state.ReferenceCategory is { } index && !(HasCategories(state.Kind) && contents.Present(state.Name, state.MissingCodes).Contains(index))
            ? state with { ReferenceCategory = null }
            : state;
    }

    /// <summary>Whether variables of a kind have categories, and so a reference among them.</summary>
    public static bool HasCategories(VariableKind kind) => kind is VariableKind.Binary or VariableKind.Categorical or VariableKind.Ordered;

    /// <summary>
    /// A state with the counts that its missing codes give: those of the first reading where the codes are the proposed ones, else
    /// counted in the source. They depend on nothing else, so that a replay finds them again.
    /// </summary>
    public async Task<VariableState> CountedAsync(
        string projectId, SourceView source, SourceContents contents, VariableState state, CancellationToken cancellation)
    {
        var seen = contents.Of(state.Name);
        return seen.MissingCodes.Where(c => c.Length > 0).ToHashSet(StringComparer.Ordinal).SetEquals(state.MissingCodes)
            ? state with { Missing = seen.Missing, Distinct = seen.Distinct, Numeric = seen.Numeric }
            : await RecountAsync(projectId, source, state, cancellation);
    }

    /// <summary>Names of the fields in which two states differ.</summary>
    public static IReadOnlyList<string> Differences(VariableState before, VariableState after)
    {
        var changed = new List<string>();
        AddIf(before.Label != after.Label, "label");
        AddIf(before.Unit != after.Unit, "unit");
        AddIf(before.Kind != after.Kind, "kind");
        AddIf(!before.MissingCodes.SequenceEqual(after.MissingCodes, StringComparer.Ordinal), "missingCodes");
        AddIf(before.ReferenceCategory != after.ReferenceCategory, "referenceCategory");
        AddIf(before.Note != after.Note, "note");
        return changed;

        void AddIf(bool differs, string field)
        {
            if (differs)
            {
                changed.Add(field);
            }
        }
    }

    private async Task<VariableState> RecountAsync(string projectId, SourceView source, VariableState state, CancellationToken cancellation)
    {
        var column = (CategoryColumn)(await columns.ReadAsync(projectId, source, [new ColumnRequest(state.Name, false, state.MissingCodes)], cancellation))[0];
        long missing = 0;
        var met = new bool[column.Categories.Count];
        foreach (var code in column.Codes)
        {
            if (code < 0)
            {
                missing++;
            }
            else
            {
                met[code] = true;
            }
        }

        var distinct = column.Categories.Where((_, i) => met[i]).ToList();
        var numeric = distinct.Count > 0 && distinct.TrueForAll(text => DecimalReader.TryRead(text, source.Dialect.DecimalMark, out _, out _));
        return state with { Missing = missing, Distinct = distinct.Count, Numeric = numeric };
    }

    private async Task RequireKindAsync(string projectId, SourceView source, SourceContents contents, VariableState state, CancellationToken cancellation)
    {
        switch (state.Kind)
        {
            case VariableKind.Continuous when !state.Numeric:
                try
                {
                    await columns.ReadAsync(projectId, source, [new ColumnRequest(state.Name, true, state.MissingCodes)], cancellation);
                }
                catch (IntakeRefusedException refused)
                {
                    throw new RefusedException(
                        RefusalKind.Invalid,
                        $"'{state.Name}' cannot be continuous: not every value is a number. Declare the texts that mean missing as missing codes, or correct the source. Nothing was stored.",
                        [.. refused.Problems.Select(p => new RefusalDetail(p.Row, p.Column, p.Message))]);
                }

                throw RefusedException.Invalid($"'{state.Name}' cannot be continuous: it has no value that is a number.", state.Name);
            case VariableKind.Date when contents.Find(state.Name) is { } column && column.ProposedKind != VariableKind.Date
                && !column.Questions.Any(q => q.Code.StartsWith("date-", StringComparison.Ordinal)):
                throw RefusedException.Invalid($"'{state.Name}' holds no dates. Nothing was stored.", "kind");
            case VariableKind.Binary when state.Distinct != 2:
                throw RefusedException.Invalid($"'{state.Name}' has {state.Distinct} distinct values; a binary variable has two. Nothing was stored.", "kind");
            case VariableKind.Categorical or VariableKind.Ordered when state.Distinct > 0 && contents.Categories(state.Name).Count == 0:
                throw RefusedException.Invalid(
                    $"'{state.Name}' has {state.Distinct} distinct values, more than the {DatasetColumns.MostCategories} that can be told apart as categories. Nothing was stored.", "kind");
        }
    }

    private static int IndexOf(VariableState state, SourceContents contents, string category)
    {
        var categories = contents.Categories(state.Name);
        var present = contents.Present(state.Name, state.MissingCodes);
        for (var i = 0; i < categories.Count; i++)
        {
            if (string.Equals(categories[i], category, StringComparison.Ordinal) && present.Contains(i))
            {
                return i;
            }
        }

        throw RefusedException.Invalid(
            $"'{category}' is no category of '{state.Name}'. The categories are: {string.Join(", ", present.Take(40).Select(i => categories[i]))}.", "referenceCategory");
    }

    private static IReadOnlyList<string> Codes(IReadOnlyList<string> codes)
    {
        var trimmed = codes.Select(c => c?.Trim() ?? string.Empty).Where(c => c.Length > 0).Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal).ToList();
        foreach (var code in trimmed)
        {
            Reasons.Name(code, "missing code");
        }

        return trimmed;
    }

    private static string? Cleared(string? given, string? before, string field) =>
        given is null ? before : string.IsNullOrWhiteSpace(given) ? null : Reasons.Text(given, field, string.Empty, field == "note" ? Reasons.LongestText : Reasons.LongestName);
}
