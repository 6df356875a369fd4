using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Revisions;

/// <summary>A coefficient with the name of its category.</summary>
public sealed record CoefficientReading(
    string Term, string? Category, double Estimate, double? Lower, double? Upper, double? P, double? StandardError, double? T,
    double? Standardized, double? PartialR, double? SemiPartialR, double? Vif);

/// <summary>The decision that led to a revision.</summary>
public sealed record DecisionReading(
    DecisionKind Kind, string Reason, string? Term, bool ByRule, RemovalEvidence? Evidence, IReadOnlyList<long>? Rows, ExclusionCause? Cause,
    string? FromRevisionId, string? RuleSays, Author? By, DateTimeOffset? At);

/// <summary>A term of a model with the reference category behind its coefficients.</summary>
/// <param name="Term">Its text.</param>
/// <param name="Df">Its columns.</param>
/// <param name="F">Partial F given all others.</param>
/// <param name="P">Its p.</param>
/// <param name="PartialRSquared">Share of what the others leave.</param>
/// <param name="Vif">Variance inflation, generalised for several columns.</param>
/// <param name="SumOfSquares">What its removal adds to the residual sum of squares.</param>
/// <param name="Removable">Neither held in nor needed by a power.</param>
/// <param name="HeldIn">Held in on this path.</param>
/// <param name="Reference">The reference category, or null.</param>
public sealed record TermReading(
    string Term, int Df, double? F, double? P, double? PartialRSquared, double? Vif, double SumOfSquares, bool Removable, bool HeldIn, string? Reference);

/// <summary>A check of an assumption. None is computed yet.</summary>
public sealed record CheckReading(string Name, double? Statistic, double? Df, double? P, double? Size, string State);

/// <summary>A finding at a revision.</summary>
public sealed record FindingReading(string? Id, FindingRecord Finding, FindingState State);

/// <summary>A revision with everything that a page or a caller shows. Of a preview, id, hash, author and time are null.</summary>
/// <param name="Id">Its id.</param>
/// <param name="Number">Its number on the path.</param>
/// <param name="PathId">Its path.</param>
/// <param name="Hash">Hash of its entry.</param>
/// <param name="EntryNumber">Number of its entry.</param>
/// <param name="Decision">What led to it.</param>
/// <param name="Outcome">The outcome.</param>
/// <param name="Intercept">Whether it has an intercept.</param>
/// <param name="Confidence">Level of the intervals.</param>
/// <param name="N">Rows analysed.</param>
/// <param name="Model">The terms as they can be sent back.</param>
/// <param name="Terms">Tests of the terms.</param>
/// <param name="Coefficients">Coefficients, the intercept first.</param>
/// <param name="Losses">What the model would be without each removable term.</param>
/// <param name="Weakest">The removable term whose loss has the largest p, or null.</param>
/// <param name="Fit">Figures of the whole model.</param>
/// <param name="Checks">Checks of the assumptions.</param>
/// <param name="Collinearity">Sets of tied predictors.</param>
/// <param name="Findings">Findings that stand at this revision, with their present state.</param>
/// <param name="PreparationId">The preparation, or null: all rows.</param>
/// <param name="Rows">The rows analysed and what missing values cost.</param>
/// <param name="Notices">What a reader must know before reading the figures.</param>
/// <param name="Fingerprint">SHA-256 of all that the figures depend on.</param>
/// <param name="Methods">Versions of the methods.</param>
public sealed record RevisionReading(
    string? Id, int Number, string PathId, Sha256Hash? Hash, long? EntryNumber, DecisionReading Decision, string Outcome, bool Intercept, double Confidence, int N,
    IReadOnlyList<Term> Model, IReadOnlyList<TermReading> Terms, IReadOnlyList<CoefficientReading> Coefficients, IReadOnlyList<RevisionLoss> Losses, string? Weakest,
    RevisionFit Fit, IReadOnlyList<CheckReading> Checks, IReadOnlyList<TiedVariables> Collinearity, IReadOnlyList<FindingReading> Findings,
    string? PreparationId, AnalysedRows Rows, IReadOnlyList<string> Notices, Sha256Hash Fingerprint, IReadOnlyList<string> Methods);
