using System.Text;
using Microsoft.AspNetCore.OpenApi;

namespace ModelLab.Web.Features.ApiReference;

/// <summary>The description of the API as JSON and as a page to read. The page is plain HTML of our own: it runs no script and asks nobody else for anything.</summary>
public static class ApiReferenceEndpoints
{
    /// <summary>Maps <c>/openapi/v1.json</c>, <c>/openapi/v1</c> and its style.</summary>
    public static void MapApiReference(this IEndpointRouteBuilder endpoints)
    {
        endpoints.MapOpenApi("/openapi/{documentName}.json").AllowAnonymous();
        endpoints.MapGet("/openapi", () => Results.Redirect("/openapi/v1")).AllowAnonymous().ExcludeFromDescription();
        endpoints.MapGet("/openapi/v1", PageAsync).AllowAnonymous().ExcludeFromDescription();
        endpoints.MapGet("/openapi/reference.css", () => Results.Stream(Style(), "text/css; charset=utf-8")).AllowAnonymous().ExcludeFromDescription();
    }

    private static async Task<IResult> PageAsync(
        [Microsoft.Extensions.DependencyInjection.FromKeyedServices(OpenApiRegistration.DocumentName)] IOpenApiDocumentProvider documents, CancellationToken cancellation) =>
        Results.Text(ApiReferencePage.Render(await documents.GetOpenApiDocumentAsync(cancellation)), "text/html", Encoding.UTF8);

    private static Stream Style() =>
        typeof(ApiReferenceEndpoints).Assembly.GetManifestResourceStream("reference.css")
        ?? throw new InvalidOperationException("The style of the API reference is not in the program.");
}
