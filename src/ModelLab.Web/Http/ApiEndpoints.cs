using ModelLab.Web.Features.Comments;
using ModelLab.Web.Features.Datasets;
using ModelLab.Web.Features.Findings;
using ModelLab.Web.Features.Ledgers;
using ModelLab.Web.Features.Paths;
using ModelLab.Web.Features.People;
using ModelLab.Web.Features.Preparations;
using ModelLab.Web.Features.Projects;
using ModelLab.Web.Features.Revisions;
using ModelLab.Web.Features.Sources;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Http;

/// <summary>Everything under <c>/api/v1</c>.</summary>
public static class ApiEndpoints
{
    /// <summary>Where the API begins.</summary>
    public const string Root = "/api/v1";

    /// <summary>Maps all endpoints of the API; each needs a token or a session.</summary>
    public static void MapApi(this IEndpointRouteBuilder endpoints, ServerSettings settings)
    {
        var api = endpoints.MapGroup(Root).RequireAuthorization();
        api.MapPeople();
        api.MapTokens();
        api.MapProjects();
        api.MapMembers();
        api.MapSources(settings.Uploads);
        api.MapDatasets();
        api.MapPreparations();
        api.MapPaths();
        api.MapRevisions();
        api.MapComments();
        api.MapFindings();
        api.MapLedgers();
    }
}
