using Microsoft.AspNetCore.Mvc;

namespace ModelLab.Web.Http;

/// <summary>Says in an endpoint's description which problems it answers with.</summary>
public static class EndpointProblems
{
    /// <summary>Adds the statuses.</summary>
    public static RouteHandlerBuilder WithProblems(this RouteHandlerBuilder endpoint, params int[] statuses)
    {
        foreach (var status in statuses)
        {
            endpoint.Produces<ProblemDetails>(status, Problems.MediaType);
        }

        return endpoint;
    }
}
