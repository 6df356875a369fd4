using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Ledger;
using ModelLab.Projects.People;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Entries;

/// <summary>What one kind of entry says. The kind's name and version stand in <see cref="EntryKinds"/>.</summary>
public interface IEntryBody;

/// <summary>A project was opened; its author is its first owner.</summary>
public sealed record ProjectOpened(string Name, string Question) : IEntryBody;

/// <summary>A person joined, or came back.</summary>
public sealed record MemberJoined(string PersonId, string Name, Role Role) : IEntryBody;

/// <summary>A member's role changed.</summary>
public sealed record MemberRoleChanged(string PersonId, Role Role) : IEntryBody;

/// <summary>A member left the project; what the person did stays.</summary>
public sealed record MemberLeft(string PersonId) : IEntryBody;

/// <summary>A file was received. Sealed: its name.</summary>
public sealed record SourceReceived(string SourceId, Sha256Hash Sha256, long Bytes, long Rows, CsvDialect Dialect, string Method) : IEntryBody;

/// <summary>One variable as read and, where the file corrects an earlier one, as described before.</summary>
public sealed record VariableState(
    string Id, string Name, string? Label, string? Unit, VariableKind Kind, bool Confirmed, bool Numeric, long Missing, long Distinct,
    IReadOnlyList<string> MissingCodes, int? ReferenceCategory, string? Note, IReadOnlyList<string> Questions);

/// <summary>A table was read from a source. Sealed: what was seen of its columns (values, ranges).</summary>
public sealed record DatasetRead(string DatasetId, string SourceId, string? PreviousDatasetId, long Rows, IReadOnlyList<VariableState> Variables) : IEntryBody;

/// <summary>A variable's description was changed or confirmed.</summary>
/// <param name="DatasetId">The dataset.</param>
/// <param name="State">The description from now on.</param>
/// <param name="Changed">The fields that differ from before; empty where it was confirmed as it is.</param>
public sealed record VariableDescribed(string DatasetId, VariableState State, IReadOnlyList<string> Changed) : IEntryBody;

/// <summary>A preparation was made. Sealed: the names of new categories, by step.</summary>
public sealed record PreparationMade(
    string PreparationId, string DatasetId, string? BasedOnId, long DictionaryEntry, IReadOnlyList<PreparationStep> Steps) : IEntryBody;

/// <summary>A path began.</summary>
public sealed record PathStarted(string PathId, string Name, PathPlan Plan, string? FromRevisionId, string? AgainOfPathId) : IEntryBody;

/// <summary>A model was fitted and stands on a path.</summary>
/// <param name="RevisionId">Its id.</param>
/// <param name="PathId">Its path.</param>
/// <param name="Number">Its number on the path, from 1.</param>
/// <param name="Decision">What led to it.</param>
/// <param name="Terms">The terms of the model, in order.</param>
/// <param name="PreparationId">The preparation in force, or null.</param>
/// <param name="Rows">The rows analysed.</param>
/// <param name="Figures">What was computed.</param>
/// <param name="FullModelMeanSquare">Residual mean square of the model with all candidates on the same rows, behind Cp; null where it cannot be fitted.</param>
/// <param name="Fingerprint">SHA-256 of all that the figures depend on.</param>
/// <param name="Methods">Versions of the methods that made the figures, and of the rules that looked for findings.</param>
public sealed record RevisionMade(
    string RevisionId, string PathId, int Number, DecisionRecord Decision, IReadOnlyList<Term> Terms, string? PreparationId,
    AnalysedRows Rows, RevisionFigures Figures, double? FullModelMeanSquare, Sha256Hash Fingerprint, IReadOnlyList<string> Methods) : IEntryBody;

/// <summary>The path's rule was run: what it took, and why it stopped. Written also where it took nothing.</summary>
public sealed record RuleRun(string PathId, string AfterRevisionId, IReadOnlyList<string> RevisionIds, string Ending) : IEntryBody;

/// <summary>A remark was made.</summary>
public sealed record CommentMade(string CommentId, Place Place, string? ReplyTo, string Text) : IEntryBody;

/// <summary>A remark was settled.</summary>
public sealed record CommentSettled(string CommentId) : IEntryBody;

/// <summary>The program raised a finding.</summary>
public sealed record FindingRaised(string FindingId, FindingRecord Finding) : IEntryBody;

/// <summary>A finding was accepted with a reason.</summary>
public sealed record FindingAccepted(string FindingId) : IEntryBody;

/// <summary>The cause of a finding is gone.</summary>
public sealed record FindingGone(string FindingId) : IEntryBody;
