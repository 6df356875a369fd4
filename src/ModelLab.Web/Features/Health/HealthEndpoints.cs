using ModelLab.Web.Startup;

namespace ModelLab.Web.Features.Health;

/// <summary>Health for whoever runs the server: is the process alive, is it ready for work.</summary>
public static class HealthEndpoints
{
    /// <summary>Maps <c>/health/live</c> and <c>/health/ready</c>.</summary>
    public static void MapHealth(this IEndpointRouteBuilder endpoints)
    {
        var health = endpoints.MapGroup("/health").AllowAnonymous().WithTags("Health");
        health.MapGet("/live", () => TypedResults.Ok(new HealthAnswer("alive")))
            .WithName("Live")
            .WithSummary("Says that the process answers.");
        health.MapGet("/ready", (Readiness readiness) => readiness.IsReady
                ? Results.Ok(new HealthAnswer(readiness.Stage))
                : Results.Json(new HealthAnswer(readiness.Stage), statusCode: StatusCodes.Status503ServiceUnavailable))
            .WithName("Ready")
            .WithSummary("Says whether the start is done: 503 until the database has its schema and, in Development, the demo project is there.")
            .Produces<HealthAnswer>()
            .Produces<HealthAnswer>(StatusCodes.Status503ServiceUnavailable);
    }
}

/// <summary>Answer of the health endpoints.</summary>
/// <param name="Status"><c>alive</c>, <c>ready</c>, or what the start is doing.</param>
public sealed record HealthAnswer(string Status);
