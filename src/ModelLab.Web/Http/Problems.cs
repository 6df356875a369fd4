using System.Diagnostics;
using Microsoft.AspNetCore.Mvc;
using Microsoft.AspNetCore.WebUtilities;
using ModelLab.Projects;

namespace ModelLab.Web.Http;

/// <summary>
/// Refusals and faults as RFC 9457 problem details: <c>title</c> is the phrase of the status, <c>detail</c> says in plain words what
/// is wrong and what to do, <c>kind</c> is a stable word for programs, <c>errors</c> lists the places, <c>traceId</c> finds the request in the log.
/// </summary>
public static class Problems
{
    /// <summary>Media type of every problem.</summary>
    public const string MediaType = "application/problem+json";

    /// <summary>Forms a problem.</summary>
    public static ProblemDetails Of(HttpContext context, int status, string kind, string detail, IReadOnlyList<RefusalDetail>? errors = null)
    {
        var problem = new ProblemDetails
        {
            Type = "about:blank",
            Status = status,
            Title = ReasonPhrases.GetReasonPhrase(status),
            Detail = detail,
            Instance = context.Request.Path,
        };
        problem.Extensions["kind"] = kind;
        if (errors is { Count: > 0 })
        {
            problem.Extensions["errors"] = errors;
        }

        problem.Extensions["traceId"] = TraceId(context);
        return problem;
    }

    /// <summary>Writes a problem as the answer.</summary>
    public static Task WriteAsync(HttpContext context, int status, string kind, string detail, IReadOnlyList<RefusalDetail>? errors = null) =>
        WriteAsync(context, Of(context, status, kind, detail, errors));

    /// <summary>Writes a problem as the answer.</summary>
    public static async Task WriteAsync(HttpContext context, ProblemDetails problem)
    {
        context.Response.StatusCode = problem.Status ?? StatusCodes.Status500InternalServerError;
        await context.Response.WriteAsJsonAsync(problem, ApiJson.Options, MediaType, context.RequestAborted);
    }

    /// <summary>The name under which the log knows this request.</summary>
    public static string TraceId(HttpContext context) => Activity.Current?.TraceId.ToString() ?? context.TraceIdentifier;
}
