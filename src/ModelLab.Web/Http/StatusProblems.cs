namespace ModelLab.Web.Http;

/// <summary>Gives answers that the framework leaves empty (no such address, method not offered, ...) their problem details.</summary>
public static class StatusProblems
{
    /// <summary>What a body may be.</summary>
    public const string MediaTypes = "The Content-Type of the body is not read here. Send application/json, for an upload multipart/form-data with a boundary.";

    /// <summary>Writes the problem of an empty answer's status.</summary>
    public static Task WriteAsync(HttpContext context)
    {
        var status = context.Response.StatusCode;
        var (kind, detail) = status switch
        {
            StatusCodes.Status401Unauthorized => ("notSignedIn", "Sign in, or send an API token as Authorization: Bearer TOKEN."),
            StatusCodes.Status403Forbidden => ("forbidden", "You may not do this."),
            StatusCodes.Status404NotFound => ("notFound", $"There is nothing at {context.Request.Path}. The addresses are listed at /openapi/v1.json."),
            StatusCodes.Status405MethodNotAllowed => ("method", $"{context.Request.Method} is not offered here; offered is {context.Response.Headers.Allow}."),
            StatusCodes.Status406NotAcceptable => ("notAcceptable", "None of the media types asked for is offered here."),
            StatusCodes.Status413PayloadTooLarge => ("tooLarge", "The body is larger than what is allowed here. Nothing was stored."),
            StatusCodes.Status415UnsupportedMediaType => ("mediaType", MediaTypes),
            _ => ("refused", "The request was not carried out."),
        };
        if (status == StatusCodes.Status401Unauthorized && context.Response.Headers.WWWAuthenticate.Count == 0)
        {
            // RFC 9110, section 11.6.1: a 401 says how to authenticate.
            context.Response.Headers.WWWAuthenticate = "Bearer";
        }

        return Problems.WriteAsync(context, status, kind, detail);
    }
}
