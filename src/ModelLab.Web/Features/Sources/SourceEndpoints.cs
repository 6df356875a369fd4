using System.Security.Claims;
using Microsoft.AspNetCore.Mvc;
using ModelLab.Projects.Sources;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Features.Sources;

/// <summary>Upload of data files, and their bytes given back. The file goes from the network into the vault as it comes; it is never held in memory or in a file of the open.</summary>
public static class SourceEndpoints
{
    private const long RoomForOtherParts = 1024 * 1024;

    /// <summary>Maps the endpoints. The limit on the size of requests is raised for the upload alone.</summary>
    public static void MapSources(this IEndpointRouteBuilder api, UploadSettings settings)
    {
        api.MapGet("/projects/{project}/sources", async (string project, ClaimsPrincipal user, ReadSources read, CancellationToken cancellation) =>
                TypedResults.Ok(await read.AllAsync(user.ToCaller(), project, cancellation)))
            .WithTags("Sources and datasets")
            .WithName("ListSources")
            .WithSummary("All sources of a project, oldest first, with their hashes.")
            .WithProblems(404);
        api.MapGet("/projects/{project}/sources/{source}/content", ContentAsync)
            .WithTags("Sources and datasets")
            .WithName("ReadSourceContent")
            .WithSummary("The bytes of a source as they were received.")
            .Produces<Stream>(StatusCodes.Status200OK, "application/octet-stream")
            .WithProblems(404, 410);
        api.MapPost("/projects/{project}/sources", UploadAsync)
            .WithTags("Sources and datasets")
            .WithName("UploadSource")
            .WithSummary("Takes in a file as a source and reads a dataset from it.")
            .WithDescription(
                "multipart/form-data with the part `file` and, where wanted, the fields identifiersChecked (true once somebody has made sure that columns that seem "
                + "to identify people may be kept), previousDatasetId (the dataset that the file corrects) with reason, delimiter, decimalMark, encoding.")
            .Accepts<UploadForm>("multipart/form-data")
            .Produces<SourceAnswer>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 404, 413, 415, 422)
            .WithMetadata(new RequestSizeLimitAttribute(settings.MaximumBytes + RoomForOtherParts));
    }

    /// <summary>Always as an attachment of no type: what somebody uploaded is never shown as a page of this server.</summary>
    private static async Task<IResult> ContentAsync(string project, string source, ClaimsPrincipal user, ReadSources read, CancellationToken cancellation)
    {
        var content = await read.OpenAsync(user.ToCaller(), project, source, cancellation);
        return Results.Stream(content.Content, "application/octet-stream", content.FileName ?? "source");
    }

    private static async Task<IResult> UploadAsync(
        string project, HttpContext context, ClaimsPrincipal user, ReceiveSource receive, UploadSettings settings, CancellationToken cancellation)
    {
        using var upload = new UploadReader(context.Request, settings.MaximumBytes);
        var form = new SourceForm(upload);
        var file = await form.ReadToFileAsync(cancellation);
        var received = await receive.ExecuteAsync(
            user.ToCaller(), project, form.ToRequest(file.FileName), file.Content, cancellation,
            async c =>
            {
                await form.ReadRestAsync(c);
                return form.ToRequest(file.FileName);
            });
        context.Features.Set(new ContentFingerprint(upload.ContentHash));
        return Results.Json(SourceAnswer.Of(received), statusCode: StatusCodes.Status201Created);
    }
}
