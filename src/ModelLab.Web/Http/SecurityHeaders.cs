namespace ModelLab.Web.Http;

/// <summary>Headers on every answer: nothing is loaded from elsewhere, nobody frames us, and answers are not kept by caches unless an endpoint says so.</summary>
public sealed class SecurityHeaders(RequestDelegate next)
{
    /// <summary>
    /// The policy for content. Scripts and styles are files of our own, never inline; <c>connect-src 'self'</c> takes in the
    /// WebSocket of interactive pages; pictures may be <c>data:</c> for charts saved by the browser.
    /// </summary>
    public const string ContentSecurityPolicy =
        "default-src 'none'; script-src 'self'; style-src 'self'; img-src 'self' data:; font-src 'self'; connect-src 'self'; "
        + "manifest-src 'self'; form-action 'self'; base-uri 'self'; frame-ancestors 'none'; object-src 'none'";

    /// <summary>Sets the headers when the answer begins.</summary>
    public Task InvokeAsync(HttpContext context)
    {
        context.Response.OnStarting(static state =>
        {
            var answered = (HttpContext)state;
            var headers = answered.Response.Headers;
            headers.ContentSecurityPolicy = ContentSecurityPolicy;
            headers.XContentTypeOptions = "nosniff";
            headers.XFrameOptions = "DENY";
            headers["Referrer-Policy"] = "no-referrer";
            headers["Cross-Origin-Opener-Policy"] = "same-origin";
            headers["Cross-Origin-Resource-Policy"] = "same-origin";
            headers["Permissions-Policy"] = "camera=(), geolocation=(), microphone=(), payment=(), usb=()";
            if (answered.Request.IsHttps)
            {
                // For a year: reached by TLS once, never without it again (RFC 6797).
                headers.StrictTransportSecurity = "max-age=31536000";
            }

            if (headers.CacheControl.Count == 0)
            {
                headers.CacheControl = "no-store";
            }

            return Task.CompletedTask;
        }, context);
        return next(context);
    }
}
