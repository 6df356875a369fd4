using System.Text.Json.Nodes;
using ModelLab.Intake.Csv;
using ModelLab.Ledger;
using ModelLab.Ledger.Canonical;
using ModelLab.Projects.Entries;
using ModelLab.Statistics.Collinearity;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;
using ModelLab.Statistics.Selection;

namespace ModelLab.Projects.Modelling;

/// <summary>A fitted revision before it is recorded.</summary>
/// <param name="Terms">The terms of the model.</param>
/// <param name="Results">The figures as Statistics gives them.</param>
/// <param name="Figures">The figures as they are recorded.</param>
/// <param name="FullModelMeanSquare">Behind Cp; null where the full model cannot be fitted.</param>
/// <param name="Fingerprint">SHA-256 of all that the figures depend on.</param>
/// <param name="Fitted">The fit, for row-wise results.</param>
public sealed record FittedRevision(
    IReadOnlyList<Term> Terms, ModelResults Results, RevisionFigures Figures, double? FullModelMeanSquare, Sha256Hash Fingerprint, FittedModel Fitted);

/// <summary>Fits the model of a revision. Every figure on record comes from here: decisions, the rule and replay call the same code.</summary>
public static class RevisionFitter
{
    /// <summary>Versions of the methods behind the figures, in the order in which they work.</summary>
    public static IReadOnlyList<string> Methods { get; } = [CsvTable.MethodVersion, ModelFitter.MethodVersion, BackwardElimination.MethodVersion];

    /// <summary>Fits it.</summary>
    /// <param name="data">Columns and rows.</param>
    /// <param name="plan">Outcome, intercept, terms held in, level.</param>
    /// <param name="terms">Terms of the model.</param>
    /// <param name="knownFullModelMeanSquare">From an earlier revision on the same rows, or null: it is computed.</param>
    /// <exception cref="RefusedException">The model cannot be fitted; says why and names the variables.</exception>
    public static FittedRevision Fit(AnalysisData data, PathPlan plan, IReadOnlyList<Term> terms, double? knownFullModelMeanSquare = null)
    {
        try
        {
            var isFull = terms.Count == plan.Candidates.Count && plan.Candidates.All(terms.Contains);
            var full = isFull ? null : knownFullModelMeanSquare ?? FullModelMeanSquare(data, plan);
            var design = Design.Create(data.Table, new ModelSpecification(plan.Outcome, terms, plan.Intercept), data.Rows);
            var fitted = ModelFitter.Fit(design, new FitOptions(plan.Confidence, plan.HeldIn, full));
            var results = fitted.Results;
            if (isFull && !results.Fit.ExactFit)
            {
                // Against itself Cp is the number of coefficients, without rounding.
                full = results.Fit.SsResidual / results.Fit.DfResidual;
                results = results with { Fit = results.Fit with { Cp = results.Coefficients.Count } };
            }

            return new FittedRevision(terms, results, Figures(data, plan, design.Codings, results, terms), full, Fingerprint(data, plan, terms), fitted);
        }
        catch (ModelRefusedException refused)
        {
            throw new RefusedException(RefusalKind.Invalid, refused.Message, [.. refused.Variables.Select(v => new RefusalDetail(null, v, refused.Message))]);
        }
    }

    private static double? FullModelMeanSquare(AnalysisData data, PathPlan plan)
    {
        try
        {
            var design = Design.Create(data.Table, new ModelSpecification(plan.Outcome, plan.Candidates, plan.Intercept), data.Rows);
            var fit = ModelFitter.Fit(design, new FitOptions(plan.Confidence, plan.HeldIn)).Results.Fit;
            return fit.ExactFit ? null : fit.SsResidual / fit.DfResidual;
        }
        catch (ModelRefusedException)
        {
            return null;
        }
    }

    private static RevisionFigures Figures(
        AnalysisData data, PathPlan plan, IReadOnlyList<CategoryCoding> codings, ModelResults results, IReadOnlyList<Term> terms)
    {
        var correlations = data.CorrelationsAmong(terms.OfType<VariableTerm>().Select(t => t.Variable).ToHashSet(StringComparer.Ordinal));
        var f = results.Fit;
        return new RevisionFigures(
            [.. results.Coefficients.Select(c => new RevisionCoefficient(
                c.Term?.Text ?? "intercept", c.CategoryIndex, c.Estimate, c.Lower, c.Upper, c.P, c.StandardError, c.T, c.Standardized, c.PartialR, c.SemiPartialR, c.Vif))],
            [.. results.Terms.Select(t => new RevisionTerm(t.Term.Text, t.Df, t.SumOfSquares, t.F, t.P, t.PartialRSquared, t.Vif, t.Removable, codings.FirstOrDefault(c => c.Term.Equals(t.Term))?.ReferenceIndex))],
            [.. results.Losses.Select(l => new RevisionLoss(
                l.Term.Text, l.Df, l.F, l.P, l.SumOfSquares, l.RSquaredLoss, l.AdjustedRSquaredChange, l.AicChange, l.AiccChange, l.BicChange))],
            new RevisionFit(
                f.N, f.S, f.DfResidual, f.RSquared, f.AdjustedRSquared, f.PredictedRSquared, f.F, f.DfModel, f.P, f.SsModel, f.SsResidual, f.SsTotal,
                f.Press, f.LogLikelihood, f.Aic, f.Aicc, f.Bic, f.Cp, f.R, f.ExactFit),
            [.. TiedPredictors.Find(correlations).Select(s => new TiedVariables(s.Variables, [.. s.Pairs.Select(p => new TiedPair(p.First, p.Second, p.R!.Value))]))]);
    }

    private static Sha256Hash Fingerprint(AnalysisData data, PathPlan plan, IReadOnlyList<Term> terms) =>
        Sha256Hash.Of(CanonicalJson.Serialise(new JsonObject
        {
            ["dataset"] = plan.DatasetId,
            ["source"] = data.Source.Sha256.ToString(),
            ["dictionary"] = plan.DictionaryEntry,
            ["preparation"] = data.Preparation?.Id,
            ["outcome"] = plan.Outcome,
            ["terms"] = new JsonArray([.. terms.Select(t => (JsonNode)t.Text)]),
            ["candidates"] = new JsonArray([.. plan.Candidates.Select(t => (JsonNode)t.Text)]),
            ["intercept"] = plan.Intercept,
            ["heldIn"] = new JsonArray([.. plan.HeldIn.Select(t => (JsonNode)t.Text)]),
            ["covariance"] = plan.Covariance,
            ["confidence"] = plan.Confidence,
            ["rows"] = data.Facts.Hash.ToString(),
            ["methods"] = new JsonArray([.. Methods.Select(m => (JsonNode)m)]),
        }));
}
