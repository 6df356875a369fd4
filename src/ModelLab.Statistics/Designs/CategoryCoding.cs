namespace ModelLab.Statistics.Designs;

/// <summary>How a categorical term became 0/1 columns on the rows analysed (reference coding).</summary>
/// <param name="Term">The term.</param>
/// <param name="ReferenceIndex">Index of the category that the others are compared with.</param>
/// <param name="Reference">Its name.</param>
/// <param name="ReferenceReplaced">
/// Whether the column's own reference has no row among those analysed, so that the first category with rows stands in for it. Only
/// the meaning of the single coefficients depends on this; fit, tests of the term and fitted values do not.
/// </param>
/// <param name="LeftOut">Names of the categories without a row among those analysed: they have no column.</param>
public sealed record CategoryCoding(Term Term, int ReferenceIndex, string Reference, bool ReferenceReplaced, IReadOnlyList<string> LeftOut);
