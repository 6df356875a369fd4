using System.Security.Cryptography;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.People;

/// <summary>A person let into a project for one call.</summary>
/// <param name="ProjectId">The project.</param>
/// <param name="Person">Who, as the account stands now.</param>
/// <param name="Role">The person's role in the project.</param>
/// <param name="Needed">The role that the call needs; checked once more inside the transaction.</param>
public sealed record Admission(string ProjectId, Person Person, Role Role, Role Needed)
{
    /// <summary>The person as author of an entry.</summary>
    public Author Author => new(Person.Id, Person.Name);
}

/// <summary>An act to be recorded, before time and author are put to it.</summary>
/// <param name="Body">What.</param>
/// <param name="Reason">Why, or null.</param>
/// <param name="SealedUnder">Source whose key seals <paramref name="SealedContent"/>, or null.</param>
/// <param name="SealedContent">What was copied from that source, or null.</param>
public sealed record Act(IEntryBody Body, string? Reason = null, string? SealedUnder = null, JsonObject? SealedContent = null);

/// <summary>The door of every use case: who may come in, and the one way in which something is recorded.</summary>
public sealed class ProjectGate(IProjectStore store, IPeople people, TimeProvider clock)
{
    /// <summary>The clock of the server.</summary>
    public TimeProvider Clock => clock;

    /// <summary>A new id: a UUID of version 7 (RFC 9562), so that ids sort by time.</summary>
    public string NewId() => Guid.CreateVersion7(clock.GetUtcNow()).ToString();

    /// <summary>The caller's account, read anew.</summary>
    /// <exception cref="RefusedException">The account is gone or disabled, or the token may only read.</exception>
    public async Task<Person> PersonAsync(Caller caller, bool writes, CancellationToken cancellation)
    {
        var person = RequireActive(await people.FindAsync(caller.PersonId, cancellation));
        return writes && !caller.MayWrite
            ? throw new RefusedException(RefusalKind.Forbidden, "This token may only read. Use one of write scope.")
            : person;
    }

    /// <summary>Lets a member in.</summary>
    /// <exception cref="RefusedException">No member (NotFound, so that strangers learn nothing), or the role is too small.</exception>
    public async Task<Admission> EnterAsync(Caller caller, string projectId, Role needed, CancellationToken cancellation)
    {
        var person = await PersonAsync(caller, needed > Role.Reader, cancellation);
        var member = await store.ReadAsync(projectId, m => m.Find<MemberView>(person.Id), cancellation);
        var role = member?.Role ?? throw RefusedException.NotFound("such project");
        RequireRole(role, needed);
        return new Admission(projectId, person, role, needed);
    }

    /// <summary>Records acts: together or not at all. The guard sees the state right before them and may refuse.</summary>
    /// <remarks>A fit may take long: an account that was disabled meanwhile records nothing more.</remarks>
    public async Task<AppendedBatch> RecordAsync(
        Admission admission, IReadOnlyList<Act> acts, Action<IReadModel>? guard, CancellationToken cancellation,
        IReadOnlyList<KeptContent>? contents = null, IReadOnlyList<string>? adopted = null)
    {
        RequireActive(await people.FindAsync(admission.Person.Id, cancellation));
        var at = clock.GetUtcNow();
        var drafts = acts.Select(a => EntryKinds.Draft(a.Body, at, admission.Author, a.Reason, Seal(a))).ToList();
        return await store.CommitAsync(
            new EntryBatch(
                admission.ProjectId,
                drafts,
                model =>
                {
                    RequireRole(model.Find<MemberView>(admission.Person.Id)?.Role ?? throw RefusedException.NotFound("such project"), admission.Needed);
                    guard?.Invoke(model);
                },
                contents,
                adopted),
            cancellation);
    }

    private static Person RequireActive(Person? person) => person is { Active: true }
        ? person
        : throw new RefusedException(RefusalKind.Forbidden, "This account is disabled. Ask an administrator of the server.");

    private static SealedContent? Seal(Act act) =>
        act.SealedContent is null ? null : new SealedContent(act.SealedUnder!, RandomNumberGenerator.GetBytes(32), act.SealedContent);

    private static void RequireRole(Role role, Role needed)
    {
        if (role < needed)
        {
            var article = needed is Role.Owner or Role.Analyst ? "an" : "a";
#pragma warning disable CA1308 // a word in a sentence, not a key
            throw new RefusedException(
                RefusalKind.Forbidden,
                $"This needs {article} {needed.ToString().ToLowerInvariant()} of the project; your role is {role.ToString().ToLowerInvariant()}. Nothing was stored. An owner can change roles.");
#pragma warning restore CA1308
        }
    }
}
