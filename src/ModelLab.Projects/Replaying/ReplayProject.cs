using System.Security.Cryptography;
using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Replaying;

/// <summary>A source compared with its recorded hash.</summary>
public sealed record ReplayedSource(string Id, bool Equal, string? Problem);

/// <summary>A revision computed again.</summary>
/// <param name="Id">Its id.</param>
/// <param name="PathId">Its path.</param>
/// <param name="Number">Its number on the path.</param>
/// <param name="Equal">Every figure has the same bits, and rows and fingerprint are the same.</param>
/// <param name="LargestRelativeDifference">Over all figures; null where the two cannot be compared.</param>
/// <param name="Problem">What is different, or null.</param>
public sealed record ReplayedRevision(string Id, string PathId, int Number, bool Equal, double? LargestRelativeDifference, string? Problem);

/// <summary>What a replay found.</summary>
/// <param name="Ok">Sources are as recorded and every revision is within the tolerance.</param>
/// <param name="Tolerance">Largest relative difference that passes.</param>
/// <param name="Sources">The sources.</param>
/// <param name="Revisions">The revisions in the order of the ledger.</param>
public sealed record ReplayResult(bool Ok, double Tolerance, IReadOnlyList<ReplayedSource> Sources, IReadOnlyList<ReplayedRevision> Revisions);

/// <summary>Computes every revision again from the bytes of its source by the recorded decisions, and compares with what is stored.</summary>
public sealed class ReplayProject(ProjectGate gate, IProjectStore store, ISourceVault vault)
{
    /// <summary>Bit-equal on one machine; elsewhere logarithms and exponentials of the platform may differ by this much.</summary>
    public const double Tolerance = 1e-12;

    /// <summary>Replays a project. Read models, caches and figures on record play no part in it.</summary>
    public async Task<ReplayResult> ExecuteAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var model = new MemoryReadModel();
        var recorded = new List<RevisionMade>();
        await foreach (var bytes in store.EntriesAsync(projectId, 1, cancellation))
        {
            var entry = LedgerEntry.Parse(bytes);
            ProjectProjection.Apply(entry, model);
            if (EntryKinds.Read(entry) is RevisionMade revision)
            {
                recorded.Add(revision);
            }
        }

        var sources = new List<ReplayedSource>();
        foreach (var source in model.All<SourceView>())
        {
            sources.Add(await CompareAsync(projectId, source, cancellation));
        }

        var loader = new AnalysisDataLoader(model, vault, new DatasetColumns(vault, new ColumnCache()));
        var loaded = new Dictionary<string, AnalysisData>(StringComparer.Ordinal);
        var revisions = new List<ReplayedRevision>();
        foreach (var revision in recorded)
        {
            revisions.Add(await ReplayAsync(projectId, model, loader, loaded, revision, cancellation));
        }

        var ok = sources.TrueForAll(s => s.Equal) && revisions.TrueForAll(r => r.Problem is null && r.LargestRelativeDifference <= Tolerance);
        return new ReplayResult(ok, Tolerance, sources, revisions);
    }

    private async Task<ReplayedSource> CompareAsync(string projectId, SourceView source, CancellationToken cancellation)
    {
        try
        {
            await using var stream = vault.Open(projectId, source.Id);
            var hash = new Sha256Hash(await SHA256.HashDataAsync(stream, cancellation));
            return new ReplayedSource(source.Id, hash == source.Sha256, hash == source.Sha256 ? null : "Its bytes are not those that were received.");
        }
        catch (RefusedException refused)
        {
            return new ReplayedSource(source.Id, false, refused.Message);
        }
    }

    private static async Task<ReplayedRevision> ReplayAsync(
        string projectId, MemoryReadModel model, AnalysisDataLoader loader, Dictionary<string, AnalysisData> loaded, RevisionMade recorded, CancellationToken cancellation)
    {
        var plan = model.Find<PathView>(recorded.PathId)!.Plan;
        var key = $"{recorded.PathId}/{recorded.PreparationId}";
        try
        {
            if (!loaded.TryGetValue(key, out var data))
            {
                var preparation = recorded.PreparationId is null ? null : model.Find<PreparationView>(recorded.PreparationId);
                loaded[key] = data = await loader.LoadAsync(projectId, plan, preparation, cancellation);
            }

            var again = await Task.Run(() => RevisionFitter.Fit(data, plan, recorded.Terms), cancellation);
            var problem = data.Facts.Hash != recorded.Rows.Hash ? "The rows analysed are not the same."
                : again.Fingerprint != recorded.Fingerprint && RevisionFitter.Methods.SequenceEqual(recorded.Methods) ? "What the figures depend on is not the same."
                : null;
            var difference = FigureComparison.LargestRelativeDifference(
                new ComparedFigures(recorded.Figures, recorded.FullModelMeanSquare), new ComparedFigures(again.Figures, again.FullModelMeanSquare));
            problem ??= difference is null ? "The figures do not have the same form." : null;
            return new ReplayedRevision(recorded.RevisionId, recorded.PathId, recorded.Number, problem is null && difference == 0, difference, problem);
        }
        catch (RefusedException refused)
        {
            return new ReplayedRevision(recorded.RevisionId, recorded.PathId, recorded.Number, false, null, refused.Message);
        }
    }
}
