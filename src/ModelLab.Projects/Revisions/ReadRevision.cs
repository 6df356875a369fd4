using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Inference;

namespace ModelLab.Projects.Revisions;

/// <summary>A path with its revisions in order.</summary>
public sealed record PathReading(PathView Path, IReadOnlyList<RevisionReading> Revisions);

/// <summary>Row-wise results of a revision. They are computed when asked, not stored.</summary>
/// <param name="RowNumbers">Row numbers in the source, ascending.</param>
/// <param name="Observed">The outcome.</param>
/// <param name="Results">Fitted values, residuals and influence, in the order of the rows.</param>
public sealed record RowReading(IReadOnlyList<long> RowNumbers, IReadOnlyList<double> Observed, RowResults Results);

/// <summary>Shows paths and revisions.</summary>
public sealed class ReadRevision(ProjectGate gate, IProjectStore store, RevisionReader reader, AnalysisDataLoader loader)
{
    /// <summary>One revision.</summary>
    public async Task<RevisionReading> OneAsync(Caller caller, string projectId, string revisionId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        return await reader.ReadAsync(projectId, revisionId, cancellation);
    }

    /// <summary>One path with all its revisions.</summary>
    public async Task<PathReading> PathAsync(Caller caller, string projectId, string pathId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var path = await store.ReadAsync(projectId, m => m.Find<PathView>(pathId) ?? throw RefusedException.NotFound("such path"), cancellation);
        var ids = await store.ReadAsync(projectId, m => m.All<RevisionView>().Where(r => r.PathId == pathId).OrderBy(r => r.Number).Select(r => r.Id).ToList(), cancellation);
        return new PathReading(path, await reader.ReadAsync(projectId, ids, cancellation));
    }

    /// <summary>All paths of a project, oldest first.</summary>
    public async Task<IReadOnlyList<PathView>> PathsAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        return await store.ReadAsync(projectId, m => m.All<PathView>(), cancellation);
    }

    /// <summary>Row-wise results of a revision.</summary>
    public async Task<RowReading> RowsAsync(Caller caller, string projectId, string revisionId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var state = await store.ReadAsync(
            projectId,
            m =>
            {
                var revision = m.Find<RevisionView>(revisionId) ?? throw RefusedException.NotFound("such revision");
                return new State(revision, m.Find<PathView>(revision.PathId)!.Plan, revision.PreparationId is null ? null : m.Find<PreparationView>(revision.PreparationId));
            },
            cancellation);
        var data = await loader.LoadAsync(projectId, state.Plan, state.Preparation, cancellation);
        var results = await Task.Run(() => RevisionFitter.Fit(data, state.Plan, state.Revision.Terms).Fitted.Rows(), cancellation);
        var outcome = (NumberColumn)data.Table.Find(state.Plan.Outcome)!;
        return new RowReading([.. data.Rows.Select(r => (long)r + 1)], Pick(outcome, data.Rows), results);
    }

    private static double[] Pick(NumberColumn column, int[] rows)
    {
        var picked = new double[rows.Length];
        for (var i = 0; i < rows.Length; i++)
        {
            picked[i] = column.Values[rows[i]];
        }

        return picked;
    }

    private sealed record State(RevisionView Revision, PathPlan Plan, PreparationView? Preparation);
}
