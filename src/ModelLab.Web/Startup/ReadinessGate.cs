using ModelLab.Web.Http;

namespace ModelLab.Web.Startup;

/// <summary>Answers 503 to everything but <c>/health</c> until the start is done.</summary>
public sealed class ReadinessGate(RequestDelegate next, Readiness readiness)
{
    /// <summary>Lets a request through, or not yet.</summary>
    public async Task InvokeAsync(HttpContext context)
    {
        if (readiness.IsReady || context.Request.Path.StartsWithSegments("/health", StringComparison.Ordinal))
        {
            await next(context);
            return;
        }

        context.Response.Headers.RetryAfter = "2";
        await Problems.WriteAsync(context, StatusCodes.Status503ServiceUnavailable, "notReady", $"The server is not ready yet ({readiness.Stage}). Send the request again in a moment.");
    }
}
