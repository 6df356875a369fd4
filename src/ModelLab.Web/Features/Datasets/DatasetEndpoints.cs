using System.Security.Claims;
using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Ledger;
using ModelLab.Projects.Datasets;
using ModelLab.Statistics.Description;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Datasets;

/// <summary>Datasets and their dictionaries.</summary>
public static class DatasetEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapDatasets(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects/{project}/datasets/{dataset}").WithTags("Sources and datasets");
        group.MapGet(string.Empty, async (string project, string dataset, ClaimsPrincipal user, ReadDataset read, CancellationToken cancellation) =>
                TypedResults.Ok(DatasetAnswer.Of(await read.ExecuteAsync(user.ToCaller(), project, dataset, cancellation))))
            .WithName("ReadDataset")
            .WithSummary("A dataset with its dictionary and descriptives over all rows.")
            .WithProblems(404, 410);
        group.MapGet("/correlations", async (string project, string dataset, ClaimsPrincipal user, ReadDataset read, CancellationToken cancellation) =>
                TypedResults.Ok(await read.CorrelationsAsync(user.ToCaller(), project, dataset, cancellation)))
            .WithName("ReadCorrelations")
            .WithSummary("Pearson correlations of the continuous variables, pair by pair, over all rows.")
            .WithProblems(404, 410);
        group.MapPatch(
                "/variables/{variable}",
                async (string project, string dataset, string variable, VariableChange change, ClaimsPrincipal user, DescribeVariable describe, CancellationToken cancellation) =>
                    TypedResults.Ok(DescriptionAnswer.Of(await describe.ExecuteAsync(user.ToCaller(), project, dataset, Uri.UnescapeDataString(variable), change, cancellation))))
            .WithName("DescribeVariable")
            .WithSummary("Changes or confirms the description of a variable, addressed by id or name. Paths keep the dictionary with which they started.")
            .WithProblems(400, 403, 404, 409, 410, 422);
    }
}

/// <summary>A dataset.</summary>
/// <param name="Id">Its id.</param>
/// <param name="SourceId">The source that it was read from.</param>
/// <param name="Sha256">SHA-256 of the source's file.</param>
/// <param name="FileName">Name of the file.</param>
/// <param name="PreviousDatasetId">The dataset that it corrects, or null.</param>
/// <param name="Rows">Rows below the header.</param>
/// <param name="Dialect">How the file is written.</param>
/// <param name="ReadAt">When it was read.</param>
/// <param name="Variables">The variables in the order of the file.</param>
public sealed record DatasetAnswer(
    string Id, string SourceId, Sha256Hash Sha256, string? FileName, string? PreviousDatasetId, long Rows, CsvDialect Dialect, DateTimeOffset ReadAt,
    IReadOnlyList<VariableAnswer> Variables)
{
    /// <summary>The answer for a dataset.</summary>
    public static DatasetAnswer Of(DatasetReading reading) => new(
        reading.Dataset.Id, reading.Source.Id, reading.Source.Sha256, reading.FileName, reading.Dataset.PreviousDatasetId, reading.Dataset.Rows,
        reading.Source.Dialect, reading.Dataset.ReadAt, [.. reading.Variables.Select(VariableAnswer.Of)]);
}

/// <summary>A variable with its descriptives.</summary>
/// <param name="Id">Its id.</param>
/// <param name="Name">Header text.</param>
/// <param name="Label">Long name.</param>
/// <param name="Unit">Unit.</param>
/// <param name="Kind">Kind.</param>
/// <param name="Confirmed">Whether a person has confirmed the description.</param>
/// <param name="Numeric">Whether its values are numbers.</param>
/// <param name="Missing">Cells that are missing.</param>
/// <param name="Distinct">Distinct values.</param>
/// <param name="MissingCodes">Texts taken as missing besides the empty cell.</param>
/// <param name="ReferenceCategory">Category against which the others are read, or null.</param>
/// <param name="Note">Anything a reader should know.</param>
/// <param name="Questions">What a person should look at.</param>
/// <param name="Numbers">Descriptives, for numbers.</param>
/// <param name="Categories">Counts, for categories.</param>
public sealed record VariableAnswer(
    string Id, string Name, string? Label, string? Unit, VariableKind Kind, bool Confirmed, bool Numeric, long Missing, long Distinct,
    IReadOnlyList<string> MissingCodes, string? ReferenceCategory, string? Note, IReadOnlyList<IntakeQuestion> Questions,
    NumberDescription? Numbers, CategoryDescription? Categories)
{
    /// <summary>The answer for a variable.</summary>
    public static VariableAnswer Of(VariableReading reading) => new(
        reading.Variable.VariableId, reading.Variable.Name, reading.Variable.Label, reading.Variable.Unit, reading.Variable.Kind, reading.Variable.Confirmed,
        reading.Variable.Numeric, reading.Variable.Missing, reading.Variable.Distinct, reading.Variable.MissingCodes, reading.Reference, reading.Variable.Note,
        reading.Questions, reading.Numbers, reading.Categories);
}

/// <summary>A variable's description after a change.</summary>
/// <param name="Id">Id of the variable.</param>
/// <param name="Name">Header text.</param>
/// <param name="Label">Long name.</param>
/// <param name="Unit">Unit.</param>
/// <param name="Kind">Kind.</param>
/// <param name="Confirmed">Whether a person has confirmed the description.</param>
/// <param name="Numeric">Whether its values are numbers.</param>
/// <param name="Missing">Cells that are missing.</param>
/// <param name="Distinct">Distinct values.</param>
/// <param name="MissingCodes">Texts taken as missing besides the empty cell.</param>
/// <param name="ReferenceCategory">Category against which the others are read, or null.</param>
/// <param name="Note">Anything a reader should know.</param>
/// <param name="EntryNumber">Number of the entry that records it.</param>
public sealed record DescriptionAnswer(
    string Id, string Name, string? Label, string? Unit, VariableKind Kind, bool Confirmed, bool Numeric, long Missing, long Distinct,
    IReadOnlyList<string> MissingCodes, string? ReferenceCategory, string? Note, long EntryNumber)
{
    /// <summary>The answer for a description.</summary>
    public static DescriptionAnswer Of(DescribedVariable described) => new(
        described.Variable.VariableId, described.Variable.Name, described.Variable.Label, described.Variable.Unit, described.Variable.Kind,
        described.Variable.Confirmed, described.Variable.Numeric, described.Variable.Missing, described.Variable.Distinct, described.Variable.MissingCodes,
        described.Reference, described.Variable.Note, described.Variable.EntryNumber);
}
