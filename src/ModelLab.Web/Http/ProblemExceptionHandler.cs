using Microsoft.AspNetCore.Diagnostics;

namespace ModelLab.Web.Http;

/// <summary>Turns whatever a request ends with into problem details.</summary>
public sealed partial class ProblemExceptionHandler(ILogger<ProblemExceptionHandler> log) : IExceptionHandler
{
    /// <inheritdoc/>
    public async ValueTask<bool> TryHandleAsync(HttpContext httpContext, Exception exception, CancellationToken cancellationToken)
    {
        if (exception is OperationCanceledException && httpContext.RequestAborted.IsCancellationRequested)
        {
            httpContext.Response.StatusCode = StatusCodes.Status499ClientClosedRequest;
            return true;
        }

        var problem = ProblemTranslation.OfRefusal(httpContext, exception);
        if (problem is null)
        {
            // The route and not the path, which may hold the secret of an invitation. The endpoint itself was taken off the request before this.
            var endpoint = httpContext.Features.Get<IExceptionHandlerFeature>()?.Endpoint ?? httpContext.GetEndpoint();
            var route = (endpoint as RouteEndpoint)?.RoutePattern.RawText ?? "(no endpoint)";
            LogFault(exception, httpContext.Request.Method, route, Problems.TraceId(httpContext));
            problem = ProblemTranslation.OfFault(httpContext, exception);
        }

        await Problems.WriteAsync(httpContext, problem);
        return true;
    }

    [LoggerMessage(LogLevel.Error, "{Method} {Route} failed, trace {TraceId}")]
    private partial void LogFault(Exception exception, string method, string route, string traceId);
}
