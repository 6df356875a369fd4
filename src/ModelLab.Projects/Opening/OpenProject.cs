using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Opening;

/// <summary>Opens a project: one question, one team, one ledger. The caller becomes its owner.</summary>
public sealed class OpenProject(ProjectGate gate, IProjectStore store)
{
    /// <summary>Opens it.</summary>
    /// <exception cref="RefusedException">Name or question is missing.</exception>
    public async Task<ProjectView> ExecuteAsync(Caller caller, string? name, string? question, CancellationToken cancellation)
    {
        var person = await gate.PersonAsync(caller, writes: true, cancellation);
        var body = new ProjectOpened(
            Reasons.Name(name, "name"),
            Reasons.Text(question, "question", "Say what the project is to answer: outcome, population, use of the result."));
        var id = gate.NewId();
        var draft = EntryKinds.Draft(body, gate.Clock.GetUtcNow(), new Author(person.Id, person.Name), null);
        await store.CommitAsync(new EntryBatch(id, [draft], _ => { }), cancellation);
        return await store.ReadAsync(id, m => m.Find<ProjectView>(id)!, cancellation);
    }
}
