using ModelLab.Ledger.Entries;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Revisions;

/// <summary>Puts a recorded or a formed revision together with the names of its categories.</summary>
public sealed class RevisionReader(IProjectStore store, ISourceVault vault)
{
    /// <summary>A recorded revision.</summary>
    /// <exception cref="RefusedException">There is none, or its source was withdrawn.</exception>
    public async Task<RevisionReading> ReadAsync(string projectId, string revisionId, CancellationToken cancellation) =>
        (await ReadAsync(projectId, [revisionId], cancellation))[0];

    /// <summary>Recorded revisions, in the order asked. What several share is unsealed once.</summary>
    /// <exception cref="RefusedException">One does not exist, or its source was withdrawn.</exception>
    public async Task<IReadOnlyList<RevisionReading>> ReadAsync(string projectId, IEnumerable<string> revisionIds, CancellationToken cancellation)
    {
        var opened = new Dictionary<string, CategoryNames>(StringComparer.Ordinal);
        var readings = new List<RevisionReading>();
        foreach (var id in revisionIds)
        {
            var view = await store.ReadAsync(projectId, m => m.Find<RevisionView>(id) ?? throw RefusedException.NotFound("such revision"), cancellation);
            var entry = await store.EntryAsync(projectId, view.EntryNumber, cancellation);
            readings.Add(await ReadAsync(projectId, EntryKinds.Read<RevisionMade>(entry), entry, null, null, opened, cancellation));
        }

        return readings;
    }

    /// <summary>Revisions that were formed and not recorded.</summary>
    public async Task<IReadOnlyList<RevisionReading>> PreviewAsync(
        string projectId, IEnumerable<FormedRevision> formed, CategoryLabels? labels, CancellationToken cancellation)
    {
        var opened = new Dictionary<string, CategoryNames>(StringComparer.Ordinal);
        var readings = new List<RevisionReading>();
        foreach (var revision in formed)
        {
            readings.Add(await ReadAsync(projectId, revision.Body, null, revision, labels, opened, cancellation));
        }

        return readings;
    }

    private async Task<CategoryNames> OpenAsync(
        string projectId, State state, CategoryLabels? labels, Dictionary<string, CategoryNames> opened, CancellationToken cancellation)
    {
        var key = $"{state.Dictionary.Dataset.Id}/{state.Dictionary.Entry}/{state.Preparation?.Id}";
        if (!opened.TryGetValue(key, out var names))
        {
            var contents = await SourceContents.OpenAsync(vault, projectId, state.Dictionary.Dataset, cancellation);
            var derived = state.Preparation is null
                ? DerivedColumns.None
                : await DerivedColumns.OpenAsync(vault, projectId, state.Preparation, labels, state.PreparationDictionary!, cancellation);
            opened[key] = names = new CategoryNames(state.Dictionary, contents, derived);
        }

        return names;
    }

    private async Task<RevisionReading> ReadAsync(
        string projectId, RevisionMade body, LedgerEntry? entry, FormedRevision? formed, CategoryLabels? labels,
        Dictionary<string, CategoryNames> opened, CancellationToken cancellation)
    {
        var state = await store.ReadAsync(projectId, m => Read(m, body, formed), cancellation);
        var names = await OpenAsync(projectId, state, labels, opened, cancellation);
        var plan = state.Path.Plan;
        var byText = body.Terms.ToDictionary(t => t.Text, StringComparer.Ordinal);
        var figures = body.Figures;
        return new RevisionReading(
            entry is null ? null : body.RevisionId, body.Number, body.PathId, entry?.Hash, entry?.Number,
            Decision(body.Decision, entry), plan.Outcome, plan.Intercept, plan.Confidence, figures.Fit.N, body.Terms,
            [.. figures.Terms.Select(t => new TermReading(
                t.Term, t.Df, t.F, t.P, t.PartialRSquared, t.Vif, t.SumOfSquares, t.Removable, plan.HeldIn.Any(h => h.Text == t.Term), t.Reference is { } reference ? names.Category(byText[t.Term], reference) : null))],
            [.. figures.Coefficients.Select(c => new CoefficientReading(
                c.Term, c.Category is { } index ? names.Category(byText[c.Term], index) : null, c.Estimate, c.Lower, c.Upper, c.P, c.StandardError, c.T,
                c.Standardized, c.PartialR, c.SemiPartialR, c.Vif))],
            figures.Losses,
            figures.Losses.Where(l => l.P is not null).Reverse().MaxBy(l => l.P)?.Term, // of equal ones the last, as the rule takes it
            figures.Fit, [], figures.Tied, state.Findings, body.PreparationId, body.Rows,
            [.. names.Replaced(figures.Terms, byText), .. names.Absent(figures, byText), .. RevisionNotices.For(plan, body, state.Preparation, [.. state.Earlier, body.Decision])], body.Fingerprint, body.Methods);
    }

    private static DecisionReading Decision(DecisionRecord d, LedgerEntry? entry) =>
        new(d.Kind, d.Reason, d.Term?.Text, d.ByRule, d.Evidence, d.Rows, d.Cause, d.FromRevisionId, d.RuleSays, entry?.By, entry?.At);

    private static State Read(IReadModel model, RevisionMade body, FormedRevision? formed)
    {
        var path = model.Find<PathView>(body.PathId) ?? formed!.After.Path;
        var dataset = model.Find<DatasetView>(path.Plan.DatasetId)!;
        var preparation = body.PreparationId is null ? null : model.Find<PreparationView>(body.PreparationId) ?? formed!.After.Preparation;
        var findings = formed is null
            ? FindingsReview.AtRevision(model, body.PathId, body.Number).Select(f => new FindingReading(f.Id, f.Finding, f.State))
            : formed.After.Findings.Select(f => model.Find<FindingView>(f.Id) is { } known
                ? new FindingReading(known.Id, known.Finding, known.State)
                : new FindingReading(null, f.Finding, FindingState.Open));
        return new State(
            path,
            DataDictionary.At(model, dataset, path.Plan.DictionaryEntry),
            preparation,
            preparation is null ? null : DataDictionary.At(model, dataset, preparation.DictionaryEntry),
            [.. findings],
            [.. Ancestry(model, path, body.Number)]);
    }

    /// <summary>The decisions before a revision, through the paths that side paths left.</summary>
    private static IEnumerable<DecisionRecord> Ancestry(IReadModel model, PathView? path, int before)
    {
        while (path is not null)
        {
            var id = path.Id;
            foreach (var revision in model.All<RevisionView>().Where(r => r.PathId == id && r.Number < before))
            {
                yield return revision.Decision;
            }

            RevisionView? from = null;

            // A path run again repeats what was chosen before the path that it runs again.
            for (var first = path; from is null && first is not null; first = first.AgainOfPathId is null ? null : model.Find<PathView>(first.AgainOfPathId))
            {
                from = first.FromRevisionId is null ? null : model.Find<RevisionView>(first.FromRevisionId);
            }

            path = from is null ? null : model.Find<PathView>(from.PathId);
            before = (from?.Number ?? 0) + 1;
        }
    }

    private sealed record State(
        PathView Path, DataDictionary Dictionary, PreparationView? Preparation, DataDictionary? PreparationDictionary,
        IReadOnlyList<FindingReading> Findings, IReadOnlyList<DecisionRecord> Earlier);

    private sealed class CategoryNames(DataDictionary dictionary, SourceContents contents, DerivedColumns derived)
    {
        public string Category(Term term, int index)
        {
            var name = term.Variables[0];
            return derived.Makes(name) ? derived.Categories(name)[index] : contents.Categories(name)[index];
        }

        /// <summary>What to say where the dictionary's reference category has no row among those analysed.</summary>
        public IEnumerable<string> Replaced(IReadOnlyList<RevisionTerm> terms, Dictionary<string, Term> byText) =>
            terms.Where(t => t.Reference is { } reference && reference != Wanted(byText[t.Term]))
                .Select(t => $"The reference category of {t.Term} has no row among those analysed: its coefficients are read against {Category(byText[t.Term], t.Reference!.Value)}.");

        /// <summary>What to say of categories without a row among those analysed: the model does not speak of them.</summary>
        public IEnumerable<string> Absent(RevisionFigures figures, Dictionary<string, Term> byText)
        {
            foreach (var term in figures.Terms.Where(t => t.Reference is not null))
            {
                var met = figures.Coefficients.Where(c => c.Term == term.Term).Select(c => c.Category).Append(term.Reference).ToHashSet();
                var absent = Present(byText[term.Term]).Where(c => !met.Contains(c)).Select(c => Category(byText[term.Term], c)).ToList();
                if (absent.Count > 0)
                {
                    yield return $"{string.Join(", ", absent)} of {term.Term} {(absent.Count == 1 ? "has" : "have")} no row among those analysed: the model says nothing about {(absent.Count == 1 ? "it" : "them")}.";
                }
            }
        }

        private IEnumerable<int> Present(Term term)
        {
            var name = term.Variables[0];
            return derived.Makes(name)
                ? Enumerable.Range(0, derived.Categories(name).Count)
                : contents.Present(name, dictionary.Require(name).MissingCodes);
        }

        private int? Wanted(Term term)
        {
            var name = term.Variables[0];
            return derived.Makes(name) ? derived.Reference(name) : contents.Reference(dictionary.Require(name));
        }
    }
}
