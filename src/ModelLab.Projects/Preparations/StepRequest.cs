using ModelLab.Projects.Entries;

namespace ModelLab.Projects.Preparations;

/// <summary>Categories to be put together under a name.</summary>
public sealed record GroupRequest(string? Label, IReadOnlyList<string>? Categories);

/// <summary>A data decision as asked for.</summary>
/// <param name="Kind">What.</param>
/// <param name="Reason">Why.</param>
/// <param name="Rows">Row numbers, for excludeRows and restoreRows.</param>
/// <param name="Cause">For excludeRows.</param>
/// <param name="Variable">Id or name, for collapse.</param>
/// <param name="NewVariable">Name of the variable that collapse makes.</param>
/// <param name="Groups">For collapse: every category in exactly one group.</param>
/// <param name="Reference">For collapse: label of the reference category; the first by default.</param>
/// <param name="Variables">Ids or names, for completeCases.</param>
public sealed record StepRequest(
    StepKind? Kind, string? Reason, IReadOnlyList<long>? Rows = null, ExclusionCause? Cause = null, string? Variable = null,
    string? NewVariable = null, IReadOnlyList<GroupRequest>? Groups = null, string? Reference = null, IReadOnlyList<string>? Variables = null);

/// <summary>A preparation as asked for.</summary>
/// <param name="DatasetId">The dataset.</param>
/// <param name="BasedOnId">A preparation whose steps come first, or null.</param>
/// <param name="Steps">The steps to add, in order.</param>
public sealed record PreparationRequest(string? DatasetId, string? BasedOnId, IReadOnlyList<StepRequest>? Steps);
