using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Views;

/// <summary>A document of a project's read model, formed from the ledger alone.</summary>
public interface IView
{
    /// <summary>Id within its project and type.</summary>
    string Id { get; }
}

/// <summary>A project.</summary>
public sealed record ProjectView(string Id, string Name, string Question, DateTimeOffset OpenedAt, Author OpenedBy) : IView;

/// <summary>A member; the id is the person's. <paramref name="Role"/> is null once the person has left the project.</summary>
public sealed record MemberView(string Id, string Name, Role? Role, DateTimeOffset Since) : IView;

/// <summary>A source as received. Its file name lies in the sealed part of the entry.</summary>
public sealed record SourceView(
    string Id, Sha256Hash Sha256, long Bytes, long Rows, CsvDialect Dialect, DateTimeOffset ReceivedAt, Author ReceivedBy, long EntryNumber) : IView;

/// <summary>A table read from a source. What was seen of its columns lies in the sealed part of the entry.</summary>
public sealed record DatasetView(
    string Id, string SourceId, string? PreviousDatasetId, long Rows, IReadOnlyList<string> VariableIds, DateTimeOffset ReadAt, long EntryNumber) : IView;

/// <summary>One state of one variable of a dataset's dictionary, in force from an entry on. The id is <c>datasetId/variableId/entry</c>.</summary>
public sealed record VariableView(
    string DatasetId, string VariableId, long EntryNumber, string Name, string? Label, string? Unit, VariableKind Kind, bool Confirmed,
    bool Numeric, long Missing, long Distinct, IReadOnlyList<string> MissingCodes, int? ReferenceCategory, string? Note,
    IReadOnlyList<string> Questions) : IView
{
    /// <inheritdoc/>
    public string Id => $"{DatasetId}/{VariableId}/{EntryNumber}";
}

/// <summary>An ordered list of data decisions over a dataset.</summary>
public sealed record PreparationView(
    string Id, string DatasetId, string? BasedOnId, long DictionaryEntry, IReadOnlyList<PreparationStep> Steps, DateTimeOffset MadeAt, Author MadeBy, long EntryNumber) : IView;

/// <summary>A model path.</summary>
public sealed record PathView(
    string Id, string Name, PathPlan Plan, string? FromRevisionId, string? AgainOfPathId, string Reason, DateTimeOffset StartedAt, Author StartedBy,
    string? LastRevisionId, int Revisions) : IView;

/// <summary>One fitted model on a path; all its figures stand in the entry.</summary>
public sealed record RevisionView(
    string Id, string PathId, int Number, long EntryNumber, Sha256Hash Hash, DecisionRecord Decision, DateTimeOffset At, Author By,
    IReadOnlyList<Term> Terms, string? PreparationId, int N, double RSquared, double? AdjustedRSquared, double S, double? Aic) : IView;

/// <summary>A remark with its place.</summary>
public sealed record CommentView(
    string Id, Place Place, string? ReplyTo, string Text, DateTimeOffset At, Author By, bool Settled, DateTimeOffset? SettledAt, Author? SettledBy, string? SettledReason) : IView;

/// <summary>Where a finding stands.</summary>
public enum FindingState
{
    /// <summary>Nobody has answered it.</summary>
    Open,

    /// <summary>Accepted with a reason.</summary>
    Accepted,

    /// <summary>Its cause is gone.</summary>
    Gone,
}

/// <summary>Something that a careful reviewer would raise.</summary>
public sealed record FindingView(
    string Id, FindingRecord Finding, FindingState State, DateTimeOffset RaisedAt, long RaisedEntry, long? ChangedEntry, DateTimeOffset? ChangedAt, Author? ChangedBy, string? ChangedReason) : IView;
