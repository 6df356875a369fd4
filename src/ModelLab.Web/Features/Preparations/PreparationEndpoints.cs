using System.Security.Claims;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Preparations;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Preparations;

/// <summary>Preparations: ordered data decisions over a dataset.</summary>
public static class PreparationEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapPreparations(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects/{project}/preparations").WithTags("Preparations");
        group.MapPost(string.Empty, async (string project, PreparationRequest request, bool? preview, ClaimsPrincipal user, MakePreparation make, CancellationToken cancellation) =>
                Results.Json(
                    PreparationAnswer.Of(await make.ExecuteAsync(user.ToCaller(), project, request, preview == true, cancellation)),
                    statusCode: preview == true ? StatusCodes.Status200OK : StatusCodes.Status201Created))
            .WithName("MakePreparation")
            .WithSummary("Makes a preparation: data decisions in order, each with its reason. With ?preview=true it is worked out and not stored.")
            .Produces<PreparationAnswer>(StatusCodes.Status201Created)
            .Produces<PreparationAnswer>()
            .WithProblems(400, 403, 404, 410, 422);
        group.MapGet(string.Empty, async (string project, ClaimsPrincipal user, MakePreparation make, CancellationToken cancellation) =>
                TypedResults.Ok((await make.AllAsync(user.ToCaller(), project, cancellation)).Select(PreparationAnswer.Of).ToList()))
            .WithName("ListPreparations")
            .WithSummary("All preparations of a project, oldest first.")
            .WithProblems(404, 410);
        group.MapGet("/{preparation}", async (string project, string preparation, ClaimsPrincipal user, MakePreparation make, CancellationToken cancellation) =>
                TypedResults.Ok(PreparationAnswer.Of(await make.OneAsync(user.ToCaller(), project, preparation, cancellation))))
            .WithName("ReadPreparation")
            .WithSummary("One preparation.")
            .WithProblems(404, 410);
    }
}

/// <summary>A preparation.</summary>
/// <param name="Id">Its id.</param>
/// <param name="DatasetId">The dataset.</param>
/// <param name="BasedOnId">The preparation whose steps come first, or null.</param>
/// <param name="Steps">All steps in order.</param>
/// <param name="MadeAt">When it was made.</param>
/// <param name="MadeBy">By whom.</param>
public sealed record PreparationAnswer(
    string Id, string DatasetId, string? BasedOnId, IReadOnlyList<PreparationStepAnswer> Steps, DateTimeOffset MadeAt, Author MadeBy)
{
    /// <summary>The answer for a preparation.</summary>
    public static PreparationAnswer Of(PreparationReading reading) => new(
        reading.Preparation.Id, reading.Preparation.DatasetId, reading.Preparation.BasedOnId,
        [.. reading.Preparation.Steps.Select(s => new PreparationStepAnswer(s, s.Kind == StepKind.Collapse ? reading.Labels.Of(s.Id) : null))],
        reading.Preparation.MadeAt, reading.Preparation.MadeBy);
}

/// <summary>A step with the names of the categories that it makes.</summary>
/// <param name="Step">The step.</param>
/// <param name="Labels">For collapse: names of the new categories, in the order of the groups; else null.</param>
public sealed record PreparationStepAnswer(PreparationStep Step, IReadOnlyList<string>? Labels);
