using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Opening;

/// <summary>A project with where it stands.</summary>
/// <param name="Project">The project.</param>
/// <param name="Role">The caller's role.</param>
/// <param name="Members">People with their roles; those who left are not among them.</param>
/// <param name="Datasets">Datasets, oldest first.</param>
/// <param name="Paths">Model paths, oldest first.</param>
/// <param name="OpenComments">Comments not settled, replies not counted.</param>
/// <param name="OpenFindings">Findings that nobody answered.</param>
/// <param name="Entries">Entries of the ledger.</param>
public sealed record ProjectStanding(
    ProjectView Project, Role Role, IReadOnlyList<MemberView> Members, IReadOnlyList<DatasetView> Datasets, IReadOnlyList<PathView> Paths,
    int OpenComments, int OpenFindings, long Entries);

/// <summary>Shows projects to their members.</summary>
public sealed class ReadProjects(ProjectGate gate, IProjectStore store)
{
    /// <summary>The projects of which the caller is a member, oldest first.</summary>
    public async Task<IReadOnlyList<ProjectView>> AllAsync(Caller caller, CancellationToken cancellation)
    {
        var person = await gate.PersonAsync(caller, writes: false, cancellation);
        return await store.ProjectsOfAsync(person.Id, cancellation);
    }

    /// <summary>One project with where it stands.</summary>
    public async Task<ProjectStanding> OneAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var head = await store.HeadAsync(projectId, cancellation);
        return await store.ReadAsync(
            projectId,
            m => new ProjectStanding(
                m.Find<ProjectView>(projectId)!,
                admission.Role,
                [.. m.All<MemberView>().Where(x => x.Role is not null)],
                m.All<DatasetView>(),
                m.All<PathView>(),
                m.All<CommentView>().Count(c => c is { Settled: false, ReplyTo: null }),
                m.All<FindingView>().Count(f => f.State == FindingState.Open),
                head.Count),
            cancellation);
    }
}
