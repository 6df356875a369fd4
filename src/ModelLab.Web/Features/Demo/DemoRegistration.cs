namespace ModelLab.Web.Features.Demo;

/// <summary>Registers the demo.</summary>
public static class DemoRegistration
{
    /// <summary>Adds the loader; whether it is called is decided at the start.</summary>
    public static IServiceCollection AddDemo(this IServiceCollection services) => services
        .AddSingleton<DemoUseCases>()
        .AddSingleton<IDemoLoader, DemoLoader>();
}
