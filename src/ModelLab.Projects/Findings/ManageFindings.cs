using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Findings;

/// <summary>Lists findings and accepts them with a reason.</summary>
public sealed class ManageFindings(ProjectGate gate, IProjectStore store)
{
    /// <summary>All findings of a project, oldest first.</summary>
    public async Task<IReadOnlyList<FindingView>> AllAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        return await store.ReadAsync(projectId, m => m.All<FindingView>(), cancellation);
    }

    /// <summary>Accepts an open finding: it stays on record with the reason why the team lives with it.</summary>
    public async Task<FindingView> AcceptAsync(Caller caller, string projectId, string findingId, string? reason, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Reviewer, cancellation);
        await gate.RecordAsync(
            admission,
            [new Act(new FindingAccepted(findingId), Reasons.Require(reason))],
            model =>
            {
                var finding = model.Find<FindingView>(findingId) ?? throw RefusedException.NotFound("such finding");
                if (finding.State != FindingState.Open)
                {
                    throw new RefusedException(RefusalKind.Conflict, finding.State == FindingState.Accepted ? "This finding was accepted already." : "The cause of this finding is gone; there is nothing to accept.");
                }
            },
            cancellation);
        return await store.ReadAsync(projectId, m => m.Find<FindingView>(findingId)!, cancellation);
    }
}
