using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Comments;

/// <summary>Remarks on exact places, replies to them, and their settling.</summary>
public sealed class ManageComments(ProjectGate gate, IProjectStore store)
{
    /// <summary>All comments of a project, oldest first.</summary>
    public async Task<IReadOnlyList<CommentView>> AllAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        return await store.ReadAsync(projectId, m => m.All<CommentView>(), cancellation);
    }

    /// <summary>Makes a remark at a place that exists.</summary>
    public async Task<CommentView> MakeAsync(Caller caller, string projectId, Place? place, string? text, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Reviewer, cancellation);
        if (place is not { Kind: not null, Id: not null })
        {
            throw RefusedException.Invalid("Say what the comment is about: {\"kind\":\"revision\",\"id\":…}.", "place");
        }

        var exact = await store.ReadAsync(projectId, m => Exact(m, place), cancellation);
        return await RecordAsync(admission, exact, null, text, model => RequirePlace(model, projectId, exact), cancellation);
    }

    /// <summary>Replies to a remark; the reply stands at the same place.</summary>
    public async Task<CommentView> ReplyAsync(Caller caller, string projectId, string commentId, string? text, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Reviewer, cancellation);
        var first = await store.ReadAsync(projectId, m => Root(m, commentId), cancellation);
        return await RecordAsync(admission, first.Place, first.Id, text, model => RequireOpen(Root(model, commentId)), cancellation);
    }

    /// <summary>Settles a remark with all its replies, with a reason.</summary>
    public async Task<CommentView> SettleAsync(Caller caller, string projectId, string commentId, string? reason, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Reviewer, cancellation);
        var first = await store.ReadAsync(projectId, m => Root(m, commentId), cancellation);
        await gate.RecordAsync(
            admission, [new Act(new CommentSettled(first.Id), Reasons.Require(reason))], model => RequireOpen(Root(model, commentId)), cancellation);
        return await store.ReadAsync(projectId, m => m.Find<CommentView>(first.Id)!, cancellation);
    }

    private async Task<CommentView> RecordAsync(
        Admission admission, Place place, string? replyTo, string? text, Action<IReadModel> guard, CancellationToken cancellation)
    {
        var id = gate.NewId();
        var body = new CommentMade(id, place, replyTo, Reasons.Text(text, "text", "Write something: an empty comment says nothing."));
        await gate.RecordAsync(admission, [new Act(body)], guard, cancellation);
        return await store.ReadAsync(admission.ProjectId, m => m.Find<CommentView>(id)!, cancellation);
    }

    /// <summary>A variable may be given by its name, and a term that is a variable too; what is kept is the id and the term's text.</summary>
    private static Place Exact(IReadModel model, Place place) => place switch
    {
        { Kind: "variable", Part: { } name } when model.Find<DatasetView>(place.Id) is { } dataset =>
            place with { Part = DataDictionary.At(model, dataset).Find(name)?.VariableId ?? name },
        { Kind: "term", Part: { } name } when model.Find<RevisionView>(place.Id) is { } revision && model.Find<PathView>(revision.PathId) is { } path
            && revision.Terms.Concat(path.Plan.Candidates).OfType<VariableTerm>().FirstOrDefault(t => t.Variable == name) is { } term =>
            place with { Part = term.Text },
        _ => place,
    };

    private static CommentView Root(IReadModel model, string commentId)
    {
        var comment = model.Find<CommentView>(commentId) ?? throw RefusedException.NotFound("such comment");
        return comment.ReplyTo is null ? comment : model.Find<CommentView>(comment.ReplyTo)!;
    }

    private static void RequireOpen(CommentView comment)
    {
        if (comment.Settled)
        {
            throw new RefusedException(RefusalKind.Conflict, $"{comment.SettledBy!.Name} settled this comment. Make a new one where there is more to say; your text was not stored.");
        }
    }

    private static void RequirePlace(IReadModel model, string projectId, Place place)
    {
        var exists = place.Kind switch
        {
            "project" => place.Id == projectId && place.Part is null,
            "revision" => model.Find<RevisionView>(place.Id) is not null && place.Part is null,
            "term" => model.Find<RevisionView>(place.Id) is { } r && model.Find<PathView>(r.PathId) is { } path
                && r.Terms.Concat(path.Plan.Candidates).Any(t => t.Text == place.Part),
            "dataDecision" => model.Find<PreparationView>(place.Id)?.Steps.Any(s => s.Id == place.Part) == true,
            "variable" => model.Find<DatasetView>(place.Id)?.VariableIds.Contains(place.Part, StringComparer.Ordinal) == true,
            _ => throw RefusedException.Invalid(
                $"'{place.Kind}' is no kind of place. A comment stands at a 'revision', a 'term' (id of the revision, part the term), a 'dataDecision' (id of the preparation, part the step), a 'variable' (id of the dataset, part the variable) or the 'project'.",
                "place"),
        };
        if (!exists)
        {
            throw RefusedException.Invalid($"There is no such {place.Kind} in this project: id '{place.Id}'{(place.Part is null ? string.Empty : $", part '{place.Part}'")}.", "place");
        }
    }
}
