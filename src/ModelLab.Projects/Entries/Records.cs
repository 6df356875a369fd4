using ModelLab.Ledger;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Entries;

/// <summary>An exact place in a project.</summary>
/// <param name="Kind"><c>revision</c>, <c>term</c> (at a revision), <c>dataDecision</c>, <c>variable</c> or <c>project</c>.</param>
/// <param name="Id">Id of the revision, preparation, dataset; the project's own for <c>project</c>.</param>
/// <param name="Part">Term text, step id or variable id within it, or null.</param>
public sealed record Place(string Kind, string Id, string? Part);

/// <summary>What a data decision does.</summary>
public enum StepKind
{
    /// <summary>Leaves rows out, with a cause.</summary>
    ExcludeRows,

    /// <summary>Brings excluded rows back.</summary>
    RestoreRows,

    /// <summary>Puts categories together: makes a new variable.</summary>
    Collapse,

    /// <summary>Keeps only rows without a missing value in the variables named.</summary>
    CompleteCases,
}

/// <summary>Why rows are excluded.</summary>
public enum ExclusionCause
{
    /// <summary>The value was recorded wrongly.</summary>
    RecordingError,

    /// <summary>The unit is outside the population that the question is about.</summary>
    OutsidePopulation,

    /// <summary>The unit stands in the data twice.</summary>
    Duplicate,

    /// <summary>The row moves the model by itself.</summary>
    Influence,

    /// <summary>Another cause, said in the reason.</summary>
    Other,
}

/// <summary>One data decision. Names of categories lie in the sealed part of the preparation's entry.</summary>
/// <param name="Id">Id within the preparation; kept when a later preparation carries the step on.</param>
/// <param name="Kind">What it does.</param>
/// <param name="Reason">Why.</param>
/// <param name="Rows">Row numbers for ExcludeRows and RestoreRows.</param>
/// <param name="Cause">For ExcludeRows.</param>
/// <param name="Variable">Collapse: id of the variable.</param>
/// <param name="NewVariable">Collapse: name of the variable that it makes.</param>
/// <param name="Groups">Collapse: category indexes that go together, one list a new category, in the order of the new categories; every category in exactly one.</param>
/// <param name="Reference">Collapse: index of the new reference category.</param>
/// <param name="Variables">CompleteCases: ids of the variables.</param>
/// <param name="RowsBefore">Rows before the step.</param>
/// <param name="RowsAfter">Rows after it.</param>
/// <param name="Cells">Cells touched.</param>
/// <param name="Losses">CompleteCases: what each variable costs.</param>
public sealed record PreparationStep(
    string Id, StepKind Kind, string Reason, IReadOnlyList<long>? Rows = null, ExclusionCause? Cause = null,
    string? Variable = null, string? NewVariable = null, IReadOnlyList<IReadOnlyList<int>>? Groups = null, int? Reference = null,
    IReadOnlyList<string>? Variables = null, long RowsBefore = 0, long RowsAfter = 0, long Cells = 0, IReadOnlyList<RowLoss>? Losses = null);

/// <summary>What a variable's missing values cost.</summary>
/// <param name="Variable">Name of the variable.</param>
/// <param name="Missing">Rows in which it is missing.</param>
/// <param name="Alone">Rows lost because of it alone.</param>
public sealed record RowLoss(string Variable, long Missing, long Alone);

/// <summary>In which order a rule works.</summary>
public enum ChoosingDirection
{
    /// <summary>From the full model, one term out at a time.</summary>
    Backward,
}

/// <summary>A path's choosing rule.</summary>
public sealed record RuleRecord(ChoosingDirection Direction, Criterion Criterion, double? RemoveAbove)
{
    /// <summary>The rule as Statistics takes it.</summary>
    public ChoosingRule ToRule() => new(Criterion, RemoveAbove);
}

/// <summary>What a path fixes for all its revisions.</summary>
/// <param name="DatasetId">The dataset.</param>
/// <param name="DictionaryEntry">Entry up to which its dictionary counts; later changes do not alter the path.</param>
/// <param name="PreparationId">Preparation at the start, or null: all rows.</param>
/// <param name="Outcome">Name of the outcome.</param>
/// <param name="Candidates">All candidate terms; a row missing in any of them is not analysed.</param>
/// <param name="HeldIn">Terms that stay.</param>
/// <param name="Intercept">Whether the models have an intercept.</param>
/// <param name="Rule">Choosing rule, or null: people decide each step.</param>
/// <param name="Covariance"><c>classical</c>.</param>
/// <param name="Confidence">Level of the intervals.</param>
/// <param name="OutcomeReason">Why a binary or count outcome is modelled all the same, or null.</param>
public sealed record PathPlan(
    string DatasetId, long DictionaryEntry, string? PreparationId, string Outcome, IReadOnlyList<Term> Candidates, IReadOnlyList<Term> HeldIn,
    bool Intercept, RuleRecord? Rule, string Covariance, double Confidence, string? OutcomeReason);

/// <summary>What led to a revision.</summary>
public enum DecisionKind
{
    /// <summary>The path begins.</summary>
    Start,

    /// <summary>A term left.</summary>
    Remove,

    /// <summary>A term came in.</summary>
    Add,

    /// <summary>The path begins again from all candidates or from an earlier revision's terms.</summary>
    Restart,

    /// <summary>Rows were left out: a new preparation.</summary>
    ExcludeRows,

    /// <summary>Rows were brought back: a new preparation.</summary>
    RestoreRows,
}

/// <summary>The decision that led to a revision.</summary>
/// <param name="Kind">What was done.</param>
/// <param name="Reason">Why.</param>
/// <param name="Term">The term concerned, or null.</param>
/// <param name="ByRule">Whether the path's rule took it; else a person did, also where the person repeated what a rule had done on other data.</param>
/// <param name="Evidence">For a removed term: its figures in the revision before.</param>
/// <param name="Rows">Row numbers concerned, or null.</param>
/// <param name="Cause">Cause of an exclusion, or null.</param>
/// <param name="FromRevisionId">Revision whose terms a restart or a side path took up, or null.</param>
/// <param name="RuleSays">What the rule said of the revision before, or null.</param>
public sealed record DecisionRecord(
    DecisionKind Kind, string Reason, Term? Term = null, bool ByRule = false, RemovalEvidence? Evidence = null,
    IReadOnlyList<long>? Rows = null, ExclusionCause? Cause = null, string? FromRevisionId = null, string? RuleSays = null);

/// <summary>A term's figures at the moment it left.</summary>
public sealed record RemovalEvidence(int Df, double? F, double? P, double RSquaredLoss, double? AicChange);

/// <summary>The rows analysed: their number, the hash of their numbers, and what missing values cost.</summary>
public sealed record AnalysedRows(int Count, Sha256Hash Hash, IReadOnlyList<RowLoss> Losses);

/// <summary>How serious a finding is.</summary>
public enum FindingWeight
{
    /// <summary>Worth a look.</summary>
    Note,

    /// <summary>Changes what may be concluded.</summary>
    Serious,
}

/// <summary>A finding as recorded.</summary>
/// <param name="Rule">Name of the rule, e.g. <c>tied-predictors</c>.</param>
/// <param name="RuleVersion">Its version.</param>
/// <param name="Place">Where.</param>
/// <param name="Weight">How serious.</param>
/// <param name="Subject">What makes it the same finding at a later revision: e.g. the variables of the tied set.</param>
/// <param name="Text">One or two sentences with the numbers.</param>
/// <param name="Advice">What to consider next.</param>
public sealed record FindingRecord(string Rule, int RuleVersion, Place Place, FindingWeight Weight, IReadOnlyList<string> Subject, string Text, string Advice);
