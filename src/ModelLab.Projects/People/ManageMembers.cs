using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.People;

/// <summary>People of a project and their roles; owners only.</summary>
public sealed class ManageMembers(ProjectGate gate, IProjectStore store, IPeople people)
{
    /// <summary>Adds a person who has an account, or brings one back.</summary>
    public async Task<MemberView> AddAsync(Caller caller, string projectId, string? email, Role role, string? reason, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Owner, cancellation);
        var why = Reasons.Require(reason);
        var person = await people.FindByEmailAsync(email?.Trim() ?? string.Empty, cancellation);
        if (person is not { Active: true })
        {
            throw RefusedException.Invalid("No active account has this e-mail address. An administrator of the server can invite the person first.", "email");
        }

        await gate.RecordAsync(
            admission,
            [new Act(new MemberJoined(person.Id, person.Name, role), why)],
            model =>
            {
                if (model.Find<MemberView>(person.Id) is { Role: { } existing })
                {
                    throw new RefusedException(RefusalKind.Conflict, $"{person.Name} is a member already, with the role {existing.ToString().ToLowerInvariant()}. Change the role instead.");
                }
            },
            cancellation);
        return await MemberAsync(projectId, person.Id, cancellation);
    }

    /// <summary>Changes a member's role. The last owner stays owner.</summary>
    public async Task<MemberView> ChangeRoleAsync(Caller caller, string projectId, string personId, Role role, string? reason, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Owner, cancellation);
        await gate.RecordAsync(
            admission,
            [new Act(new MemberRoleChanged(personId, role), Reasons.Require(reason))],
            model => RequireOwnerLeft(model, personId, role),
            cancellation);
        return await MemberAsync(projectId, personId, cancellation);
    }

    /// <summary>Ends a membership. What the person did stays on record.</summary>
    public async Task RemoveAsync(Caller caller, string projectId, string personId, string? reason, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Owner, cancellation);
        await gate.RecordAsync(
            admission,
            [new Act(new MemberLeft(personId), Reasons.Require(reason))],
            model => RequireOwnerLeft(model, personId, null),
            cancellation);
    }

    private static void RequireOwnerLeft(IReadModel model, string personId, Role? newRole)
    {
        if (model.Find<MemberView>(personId) is not { Role: not null })
        {
            throw RefusedException.NotFound("such member");
        }

        var owners = model.All<MemberView>().Where(m => m.Role == Role.Owner).Select(m => m.Id).ToList();
        if (newRole != Role.Owner && owners.Count == 1 && owners[0] == personId)
        {
            throw new RefusedException(RefusalKind.Conflict, "A project keeps at least one owner. Make another member owner first.");
        }
    }

    private Task<MemberView> MemberAsync(string projectId, string personId, CancellationToken cancellation) =>
        store.ReadAsync(projectId, m => m.Find<MemberView>(personId)!, cancellation);
}
