using System.Security.Claims;
using ModelLab.Projects.Revisions;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Revisions;

/// <summary>Revisions and their row-wise results.</summary>
public static class RevisionEndpoints
{
    private const string Csv = "text/csv";
    private const string Json = "application/json";

    /// <summary>Maps the endpoints.</summary>
    public static void MapRevisions(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects/{project}/revisions/{revision}").WithTags("Revisions");
        group.MapGet(string.Empty, async (string project, string revision, ClaimsPrincipal user, ReadRevision read, CancellationToken cancellation) =>
                TypedResults.Ok(await read.OneAsync(user.ToCaller(), project, revision, cancellation)))
            .WithName("ReadRevision")
            .WithSummary("A revision: decision, coefficients, tests of the terms, fit, collinearity, findings.")
            .WithProblems(404, 410);
        group.MapGet("/rows", RowsAsync)
            .WithName("ReadRows")
            .WithSummary("Row-wise results, one line a row: as JSON, or as CSV with Accept: text/csv.")
            .WithDescription($"`statistics` names the columns wanted, with commas between: {string.Join(", ", RowStatistic.All.Select(s => s.Name))}. All of them by default; `row`, the number of the row in its source, always comes first.")
            .Produces<IReadOnlyList<IReadOnlyDictionary<string, double?>>>(StatusCodes.Status200OK, Json, Csv)
            .WithProblems(404, 406, 410, 422);
    }

    private static async Task<IResult> RowsAsync(
        string project, string revision, string? statistics, HttpContext context, ClaimsPrincipal user, ReadRevision read, CancellationToken cancellation)
    {
        var wanted = RowStatistic.Named(statistics);
        var type = MediaTypes.Best(context.Request, Json, Csv);
        if (type is null)
        {
            return Results.StatusCode(StatusCodes.Status406NotAcceptable);
        }

        var rows = await read.RowsAsync(user.ToCaller(), project, revision, cancellation);
        context.Response.Headers.Vary = "Accept";
        return type == Csv
            ? Results.Stream(body => RowLines.WriteCsvAsync(body, rows, wanted, cancellation), "text/csv; charset=utf-8; header=present", $"rows-{revision}.csv")
            : Results.Stream(body => RowLines.WriteJsonAsync(body, rows, wanted, cancellation), Json);
    }
}
