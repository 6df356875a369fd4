namespace ModelLab.Projects.Replaying;

/// <summary>A source compared with its recorded hash.</summary>
public sealed record ReplayedSource(string Id, bool Equal, string? Problem);

/// <summary>A dataset read again: its rows, what was seen of its columns, and the counts of every state of its dictionary.</summary>
/// <param name="Id">Its id.</param>
/// <param name="Equal">All is as recorded.</param>
/// <param name="Problems">What is different.</param>
public sealed record ReplayedDataset(string Id, bool Equal, IReadOnlyList<string> Problems);

/// <summary>A preparation applied again: what each of its steps does.</summary>
/// <param name="Id">Its id.</param>
/// <param name="Equal">Every step does what is recorded.</param>
/// <param name="Problems">What is different.</param>
public sealed record ReplayedPreparation(string Id, bool Equal, IReadOnlyList<string> Problems);

/// <summary>A revision computed again.</summary>
/// <param name="Id">Its id.</param>
/// <param name="PathId">Its path.</param>
/// <param name="Number">Its number on the path.</param>
/// <param name="Equal">Every figure has the same bits, and all else that is recorded is the same.</param>
/// <param name="LargestRelativeDifference">Over all figures; null where the two cannot be compared.</param>
/// <param name="Problems">What is different beyond the tolerance: rows, decision, evidence, figures, findings.</param>
public sealed record ReplayedRevision(
    string Id, string PathId, int Number, bool Equal, double? LargestRelativeDifference, IReadOnlyList<string> Problems);

/// <summary>What a replay found.</summary>
/// <param name="Ok">Nothing is different beyond the tolerance.</param>
/// <param name="Tolerance">Largest relative difference of a figure that passes.</param>
/// <param name="Sources">The sources.</param>
/// <param name="Datasets">The datasets.</param>
/// <param name="Preparations">The preparations.</param>
/// <param name="Revisions">The revisions in the order of the ledger.</param>
/// <param name="Problems">What is wrong with the record as a whole: entries that cannot be read or contradict those before them.</param>
public sealed record ReplayResult(
    bool Ok, double Tolerance, IReadOnlyList<ReplayedSource> Sources, IReadOnlyList<ReplayedDataset> Datasets,
    IReadOnlyList<ReplayedPreparation> Preparations, IReadOnlyList<ReplayedRevision> Revisions, IReadOnlyList<string> Problems);
