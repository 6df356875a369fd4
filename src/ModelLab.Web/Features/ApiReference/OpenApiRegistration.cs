using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;
using ModelLab.Web.Features.SignIn;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.ApiReference;

/// <summary>The description of the API by itself: <c>/openapi/v1.json</c>.</summary>
public static class OpenApiRegistration
{
    /// <summary>Name of the document.</summary>
    public const string DocumentName = "v1";

    private const string BearerScheme = "apiToken";
    private const string SessionScheme = "session";

    /// <summary>Registers the document.</summary>
    public static void AddApiDescription(this IServiceCollection services) => services.AddOpenApi(DocumentName, options =>
    {
        options.AddDocumentTransformer(DescribeDocument);
        options.AddOperationTransformer(DescribeOperation);
        options.AddSchemaTransformer(ApiSchemas.Describe);
    });

    private static Task DescribeDocument(OpenApiDocument document, OpenApiDocumentTransformerContext context, CancellationToken cancellation)
    {
        document.Info = new OpenApiInfo
        {
            Title = "ModelLab",
            Version = "1",
            Description =
                "Everything that a page can do, through the same use cases. Numbers are JSON numbers with the shortest digits that read back "
                + "to the same double; a value that does not exist is null. Refusals are problem details (RFC 9457): `detail` says what is wrong "
                + "and what to do, `errors` lists the places, `kind` is a stable word for programs. Members that are not known are refused. "
                + "A POST may carry an `Idempotency-Key`: sent again with the same key, the same request acts once and is answered twice.",
        };

        // The address under which the server was asked is left out, so that the document is the same everywhere.
        document.Servers = [new OpenApiServer { Url = "/" }];
        document.Components ??= new OpenApiComponents();
        document.Components.SecuritySchemes ??= new Dictionary<string, IOpenApiSecurityScheme>();
        document.Components.SecuritySchemes[BearerScheme] = new OpenApiSecurityScheme
        {
            Type = SecuritySchemeType.Http,
            Scheme = "bearer",
            Description = "An API token of a person, of scope read or write: `Authorization: Bearer TOKEN`. A page uses the session cookie instead.",
        };
        document.Components.SecuritySchemes[SessionScheme] = new OpenApiSecurityScheme
        {
            Type = SecuritySchemeType.ApiKey,
            In = ParameterLocation.Cookie,
            Name = SessionCookie.Name,
            Description = "The session of a person who signed in by `POST /sign-in`.",
        };
        return Task.CompletedTask;
    }

    private static Task DescribeOperation(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellation)
    {
        var metadata = context.Description.ActionDescriptor.EndpointMetadata;
        var open = metadata.OfType<IAllowAnonymous>().Any();
        operation.Responses ??= [];
        if (!open)
        {
            var scheme = metadata.OfType<SessionOnly>().Any() ? SessionScheme : BearerScheme;
            operation.Security = [new OpenApiSecurityRequirement { [new OpenApiSecuritySchemeReference(scheme, context.Document)] = [] }];
            AddProblem(operation, "401", "No token or session, or one that does not hold.");
        }

        AddProblem(operation, "500", "A fault of the server; the log has it under the trace id.");
        if (!open && HttpMethods.IsPost(context.Description.HttpMethod ?? string.Empty))
        {
            operation.Parameters ??= [];
            operation.Parameters.Add(new OpenApiParameter
            {
                Name = IdempotencyGate.KeyHeader,
                In = ParameterLocation.Header,
                Description = "A key of your own, 1 to 200 visible ASCII characters. The same key with the same request gives the first answer again.",
                Schema = new OpenApiSchema { Type = JsonSchemaType.String, MaxLength = 200 },
            });
        }

        return Task.CompletedTask;
    }

    private static void AddProblem(OpenApiOperation operation, string status, string description)
    {
        if (!operation.Responses!.ContainsKey(status))
        {
            operation.Responses[status] = new OpenApiResponse
            {
                Description = description,
                Content = new Dictionary<string, OpenApiMediaType> { [Problems.MediaType] = new() { Schema = ApiSchemas.Problem() } },
            };
        }
    }
}
