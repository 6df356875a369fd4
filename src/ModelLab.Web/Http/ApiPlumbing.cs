namespace ModelLab.Web.Http;

/// <summary>Registers how requests are read and how refusals are written.</summary>
public static class ApiPlumbing
{
    /// <summary>JSON, problem details, and requests that cannot be read as exceptions, so that one place words all refusals.</summary>
    public static void AddApiPlumbing(this IServiceCollection services)
    {
        services.ConfigureHttpJsonOptions(o => ApiJson.Apply(o.SerializerOptions));
        services.Configure<RouteHandlerOptions>(o => o.ThrowOnBadRequest = true);
        services.AddExceptionHandler<ProblemExceptionHandler>();
        services.AddProblemDetails();
    }
}
