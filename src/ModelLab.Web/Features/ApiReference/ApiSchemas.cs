using System.Text.Json.Nodes;
using System.Text.Json.Serialization.Metadata;
using Microsoft.AspNetCore.Mvc;
using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;
using ModelLab.Ledger;
using ModelLab.Projects.Entries;
using ModelLab.Statistics.Designs;

namespace ModelLab.Web.Features.ApiReference;

/// <summary>Schemas that the generator cannot know: of types with JSON converters of their own, and of what has to be there.</summary>
public static class ApiSchemas
{
    /// <summary>Puts a generated schema right.</summary>
    public static Task Describe(OpenApiSchema schema, OpenApiSchemaTransformerContext context, CancellationToken cancellation)
    {
        var info = context.JsonTypeInfo;
        if (Written(info.Type) is { } written)
        {
            Take(schema, written);
        }
        else if (info.Kind == JsonTypeInfoKind.Enumerable && info.ElementType is { } element && Written(element) is { } item)
        {
            schema.Items = item;
        }
        else if (info.Kind == JsonTypeInfoKind.Object && schema.Required is { Count: > 0 })
        {
            // The generator takes every parameter without a default for needed; one that may be null may be left out.
            schema.Required = info.Properties.Where(p => p.IsRequired).Select(p => p.Name).ToHashSet(StringComparer.Ordinal);
        }

        return Task.CompletedTask;
    }

    /// <summary>The schema of problem details.</summary>
    public static OpenApiSchema Problem() => Object(
        "Problem details (RFC 9457).",
        new Dictionary<string, IOpenApiSchema>
        {
            ["type"] = Text(),
            ["title"] = Text("The phrase of the status."),
            ["status"] = new OpenApiSchema { Type = JsonSchemaType.Integer },
            ["detail"] = Text("What is wrong and what to do, in plain words."),
            ["instance"] = Text("Path of the request."),
            ["kind"] = Text("A stable word for programs."),
            ["traceId"] = Text("Finds the request in the server's log."),
            ["errors"] = new OpenApiSchema
            {
                Type = JsonSchemaType.Array,
                Description = "The places, where there are any.",
                Items = Object("A place.", new Dictionary<string, IOpenApiSchema>
                {
                    ["row"] = new OpenApiSchema { Type = JsonSchemaType.Integer | JsonSchemaType.Null, Description = "Row in the source; 0 is the header." },
                    ["column"] = new OpenApiSchema { Type = JsonSchemaType.String | JsonSchemaType.Null, Description = "Variable, field, term, or JSON path." },
                    ["message"] = Text(),
                }),
            },
        });

    private static OpenApiSchema? Written(Type type) => type switch
    {
        _ when type == typeof(double) => new OpenApiSchema { Type = JsonSchemaType.Number, Format = "double" },
        _ when type == typeof(double?) => new OpenApiSchema { Type = JsonSchemaType.Number | JsonSchemaType.Null, Format = "double" },
        { IsEnum: true } => Words(type, JsonSchemaType.String),
        _ when Nullable.GetUnderlyingType(type) is { IsEnum: true } choice => Words(choice, JsonSchemaType.String | JsonSchemaType.Null),
        _ when type == typeof(Sha256Hash) => Hash(JsonSchemaType.String),
        _ when type == typeof(Sha256Hash?) => Hash(JsonSchemaType.String | JsonSchemaType.Null),
        _ when type == typeof(ProblemDetails) => Problem(),
        _ when typeof(Term).IsAssignableFrom(type) => Term(),
        _ => null,
    };

    private static OpenApiSchema Term()
    {
        var power = new Dictionary<string, IOpenApiSchema>
        {
            ["variable"] = Text(),
            ["degree"] = new OpenApiSchema { Type = JsonSchemaType.Integer, Minimum = "2", Maximum = "20" },
        };
        var term = Object(
            "A term, with one of the members: {\"variable\":\"x\"}, where a categorical variable is one term, or {\"power\":{\"variable\":\"x\",\"degree\":2}}.",
            new Dictionary<string, IOpenApiSchema> { ["variable"] = Text(), ["power"] = Object("A power of a variable.", power) });
        term.Examples = [new JsonObject { ["variable"] = "x" }];
        return term;
    }

    private static OpenApiSchema Hash(JsonSchemaType type) =>
        new() { Type = type, Pattern = "^[0-9a-f]{64}$", Description = "SHA-256, 64 lower-case hexadecimal digits." };

    private static OpenApiSchema Words(Type type, JsonSchemaType form)
    {
        var words = EnumWordConverter.WordsOf(type).Select(w => (JsonNode)w).ToList();
        if (form.HasFlag(JsonSchemaType.Null))
        {
            words.Add(JsonNullSentinel.JsonNull);
        }

        return new OpenApiSchema { Type = form, Enum = words };
    }

    private static OpenApiSchema Text(string? description = null) => new() { Type = JsonSchemaType.String, Description = description };

    private static OpenApiSchema Object(string description, Dictionary<string, IOpenApiSchema> properties) =>
        new() { Type = JsonSchemaType.Object, Description = description, Properties = properties };

    /// <summary>Keeps a description that stands with the member itself.</summary>
    private static void Take(OpenApiSchema schema, OpenApiSchema written)
    {
        schema.Type = written.Type;
        schema.Format = written.Format;
        schema.Pattern = written.Pattern;
        schema.Enum = written.Enum;
        schema.Properties = written.Properties;
        schema.Examples = written.Examples;
        schema.Description ??= written.Description;
    }
}
