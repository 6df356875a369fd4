using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;

namespace ModelLab.Projects.Replaying;

/// <summary>
/// Computes everything again from the bytes of the sources by the recorded decisions, and compares it with what is stored: sources, what was
/// seen of datasets, the effects of data decisions, rows, figures, the evidence of removals, what the rule said, findings.
/// </summary>
public sealed class ReplayProject(ProjectGate gate, IProjectStore store, ISourceVault vault)
{
    /// <summary>Bit-equal on one machine; elsewhere logarithms and exponentials of the platform may differ by this much.</summary>
    public const double Tolerance = 1e-12;

    /// <summary>Replays a project. Read models, caches and figures on record play no part in it. What cannot be computed any more is told.</summary>
    public async Task<ReplayResult> ExecuteAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var record = await RecordedProject.ReadAsync(store, projectId, cancellation);
        var columns = new DatasetColumns(vault, new ColumnCache());
        var tables = new DatasetReplay(projectId, record, vault, new VariableStates(columns));
        var sources = await EachAsync(record.All<SourceReceived>(), s => tables.SourceAsync(s, cancellation));
        var datasets = await EachAsync(record.All<DatasetRead>(), d => tables.DatasetAsync(d, cancellation));
        var steps = new PreparationReplay(projectId, record, columns);
        var preparations = await EachAsync(record.All<PreparationMade>(), p => steps.ReplayAsync(p, cancellation));
        var fits = new RevisionReplay(projectId, record, vault, columns);
        var revisions = await EachAsync(record.Revisions(), r => fits.ReplayAsync(r, cancellation));
        var ok = sources.TrueForAll(s => s.Equal) && datasets.TrueForAll(d => d.Equal) && preparations.TrueForAll(p => p.Equal)
            && revisions.TrueForAll(r => r.Problems.Count == 0) && record.Problems.Count == 0;
        return new ReplayResult(ok, Tolerance, sources, datasets, preparations, revisions, record.Problems);
    }

    private static async Task<List<TResult>> EachAsync<T, TResult>(IEnumerable<T> recorded, Func<T, Task<TResult>> replay)
    {
        var replayed = new List<TResult>();
        foreach (var one in recorded)
        {
            replayed.Add(await replay(one));
        }

        return replayed;
    }
}
