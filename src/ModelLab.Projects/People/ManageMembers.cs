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
        var disabled = await DisabledOwnersAsync(projectId, cancellation);
        await gate.RecordAsync(
            admission,
            [new Act(new MemberRoleChanged(personId, role), Reasons.Require(reason))],
            model => RequireOwnerLeft(model, personId, role, disabled),
            cancellation);
        return await MemberAsync(projectId, personId, cancellation);
    }

    /// <summary>Ends a membership. What the person did stays on record.</summary>
    public async Task RemoveAsync(Caller caller, string projectId, string personId, string? reason, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Owner, cancellation);
        var disabled = await DisabledOwnersAsync(projectId, cancellation);
        await gate.RecordAsync(
            admission,
            [new Act(new MemberLeft(personId), Reasons.Require(reason))],
            model => RequireOwnerLeft(model, personId, null, disabled),
            cancellation);
    }

    /// <summary>Owners who can do nothing, since their accounts are disabled.</summary>
    private async Task<IReadOnlySet<string>> DisabledOwnersAsync(string projectId, CancellationToken cancellation)
    {
        var owners = await store.ReadAsync(projectId, m => m.All<MemberView>().Where(x => x.Role == Role.Owner).Select(x => x.Id).ToList(), cancellation);
        var disabled = new HashSet<string>(StringComparer.Ordinal);
        foreach (var owner in owners)
        {
            if (await people.FindAsync(owner, cancellation) is not { Active: true })
            {
                disabled.Add(owner);
            }
        }

        return disabled;
    }

    private static void RequireOwnerLeft(IReadModel model, string personId, Role? newRole, IReadOnlySet<string> disabled)
    {
        if (model.Find<MemberView>(personId) is not { Role: not null })
        {
            throw RefusedException.NotFound("such member");
        }

        var owners = model.All<MemberView>().Where(m => m.Role == Role.Owner && !disabled.Contains(m.Id)).Select(m => m.Id).ToList();
        if (newRole != Role.Owner && owners.Count == 1 && owners[0] == personId)
        {
            throw new RefusedException(RefusalKind.Conflict, "A project keeps at least one owner whose account is active. Make another member owner first.");
        }
    }

    private Task<MemberView> MemberAsync(string projectId, string personId, CancellationToken cancellation) =>
        store.ReadAsync(projectId, m => m.Find<MemberView>(personId)!, cancellation);
}
