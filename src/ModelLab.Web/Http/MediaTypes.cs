using Microsoft.Net.Http.Headers;

namespace ModelLab.Web.Http;

/// <summary>Chooses a media type by <c>Accept</c> (RFC 9110, section 12.5.1).</summary>
public static class MediaTypes
{
    /// <summary>The best of those offered, the first where the caller has no preference; null where none is acceptable.</summary>
    public static string? Best(HttpRequest request, params string[] offered)
    {
        var accepted = request.GetTypedHeaders().Accept;
        return accepted.Count == 0
            ? offered[0]
            : offered.Select(o => new Offer(o, Quality(accepted, o))).Where(o => o.Quality > 0).OrderByDescending(o => o.Quality).FirstOrDefault()?.Type;
    }

    /// <summary>The quality given by the most specific range that matches.</summary>
    private static double Quality(IList<MediaTypeHeaderValue> accepted, string type)
    {
        var parsed = new MediaTypeHeaderValue(type);
        return accepted.Where(a => parsed.IsSubsetOf(a))
            .OrderBy(a => a.MatchesAllTypes ? 2 : a.MatchesAllSubTypes ? 1 : 0)
            .Select(a => a.Quality ?? 1)
            .FirstOrDefault();
    }

    private sealed record Offer(string Type, double Quality);
}
