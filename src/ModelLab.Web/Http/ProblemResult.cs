using ModelLab.Projects;

namespace ModelLab.Web.Http;

/// <summary>An answer that is a problem.</summary>
public sealed class ProblemResult(int status, string kind, string detail, IReadOnlyList<RefusalDetail>? errors = null) : IResult
{
    /// <inheritdoc/>
    public Task ExecuteAsync(HttpContext httpContext) => Problems.WriteAsync(httpContext, status, kind, detail, errors);
}
