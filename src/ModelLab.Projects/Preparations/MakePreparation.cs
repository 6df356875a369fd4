using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Preparations;

/// <summary>A preparation with the names of the categories that it makes.</summary>
public sealed record PreparationReading(PreparationView Preparation, CategoryLabels Labels);

/// <summary>Makes preparations and shows them.</summary>
public sealed class MakePreparation(ProjectGate gate, IProjectStore store, ISourceVault vault, PreparationBuilder builder)
{
    /// <summary>Makes one; with <paramref name="preview"/> it is only worked out.</summary>
    public async Task<PreparationReading> ExecuteAsync(Caller caller, string projectId, PreparationRequest request, bool preview, CancellationToken cancellation)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Analyst, cancellation);
        if (request.Steps is null || request.Steps.Count == 0)
        {
            throw RefusedException.Invalid("Give at least one data decision.", "steps");
        }

        var datasetId = request.DatasetId ?? throw RefusedException.Invalid("Name the dataset.", "datasetId");
        var basedOn = request.BasedOnId is null
            ? null
            : await store.ReadAsync(projectId, m => m.Find<PreparationView>(request.BasedOnId) ?? throw RefusedException.NotFound("such preparation"), cancellation);
        if (basedOn is not null && basedOn.DatasetId != datasetId)
        {
            throw RefusedException.Invalid("A preparation builds on one of the same dataset.", "basedOnId");
        }

        var built = await builder.BuildAsync(projectId, datasetId, null, basedOn, request.Steps, cancellation);
        if (preview)
        {
            return new PreparationReading(built.AsView(gate.Clock.GetUtcNow()), built.Labels);
        }

        await gate.RecordAsync(admission, [built.Act(built.Body.Steps[^1].Reason)], null, cancellation);
        return await ReadAsync(projectId, built.Body.PreparationId, cancellation);
    }

    /// <summary>All preparations of a project, oldest first.</summary>
    public async Task<IReadOnlyList<PreparationReading>> AllAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var all = await store.ReadAsync(projectId, m => m.All<PreparationView>(), cancellation);
        var readings = new List<PreparationReading>();
        foreach (var preparation in all)
        {
            readings.Add(new PreparationReading(preparation, await CategoryLabels.OpenAsync(vault, projectId, preparation, cancellation)));
        }

        return readings;
    }

    /// <summary>One preparation.</summary>
    public async Task<PreparationReading> OneAsync(Caller caller, string projectId, string preparationId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        return await ReadAsync(projectId, preparationId, cancellation);
    }

    private async Task<PreparationReading> ReadAsync(string projectId, string preparationId, CancellationToken cancellation)
    {
        var preparation = await store.ReadAsync(projectId, m => m.Find<PreparationView>(preparationId) ?? throw RefusedException.NotFound("such preparation"), cancellation);
        return new PreparationReading(preparation, await CategoryLabels.OpenAsync(vault, projectId, preparation, cancellation));
    }
}
