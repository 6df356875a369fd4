namespace ModelLab.Web.Http;

/// <summary>
/// Refuses requests that change something and that a browser sends on behalf of another site. Browsers say where a request comes
/// from by <c>Sec-Fetch-Site</c> and <c>Origin</c>; programs send neither and are let through, for a cookie lives in browsers only.
/// A request with an <c>Authorization</c> header is let through: no other site can make a browser add one.
/// </summary>
public sealed class CrossSiteRequests(RequestDelegate next)
{
    /// <summary>Lets a request through, or answers 403.</summary>
    public Task InvokeAsync(HttpContext context) =>
        IsForeign(context.Request)
            ? Problems.WriteAsync(context, StatusCodes.Status403Forbidden, "crossSite", "This request comes from a page of another site and was not carried out.")
            : next(context);

    private static bool IsForeign(HttpRequest request)
    {
        var safe = HttpMethods.IsGet(request.Method) || HttpMethods.IsHead(request.Method) || HttpMethods.IsOptions(request.Method);
        if (safe || request.Headers.Authorization.Count > 0)
        {
            return false;
        }

        var site = request.Headers["Sec-Fetch-Site"].ToString();
        if (site.Length > 0)
        {
            return site is not ("same-origin" or "none");
        }

        var origin = request.Headers.Origin.ToString();
        return origin.Length > 0 && !string.Equals(origin, $"{request.Scheme}://{request.Host}", StringComparison.OrdinalIgnoreCase);
    }
}
