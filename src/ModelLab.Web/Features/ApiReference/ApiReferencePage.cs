using System.Net;
using System.Text;
using Microsoft.OpenApi;

namespace ModelLab.Web.Features.ApiReference;

/// <summary>Writes the description of the API as one page of HTML.</summary>
public static class ApiReferencePage
{
    private const int DeepestSchema = 6;

    /// <summary>The page.</summary>
    public static string Render(OpenApiDocument document)
    {
        var page = new StringBuilder();
        page.Append("<!doctype html><html lang=\"en\"><head><meta charset=\"utf-8\"><meta name=\"viewport\" content=\"width=device-width\">")
            .Append("<title>ModelLab: HTTP API</title><link rel=\"stylesheet\" href=\"/openapi/reference.css\"></head><body><main>")
            .Append("<h1>HTTP API, version ").Append(Text(document.Info.Version)).Append("</h1><p>").Append(Prose(document.Info.Description)).Append("</p>")
            .Append("<p>The same as JSON: <a href=\"/openapi/v1.json\">/openapi/v1.json</a> (OpenAPI).</p>");
        var operations = document.Paths
            .SelectMany(p => (p.Value.Operations ?? []).Select(o => new Operation(p.Key, o.Key.Method, o.Value)))
            .GroupBy(o => o.Description.Tags?.FirstOrDefault()?.Name ?? string.Empty)
            .ToList();
        page.Append("<nav aria-label=\"Contents\"><ul>");
        foreach (var group in operations)
        {
            page.Append("<li><a href=\"#").Append(Anchor(group.Key)).Append("\">").Append(Text(group.Key)).Append("</a></li>");
        }

        page.Append("</ul></nav>");
        foreach (var group in operations)
        {
            page.Append("<h2 id=\"").Append(Anchor(group.Key)).Append("\">").Append(Text(group.Key)).Append("</h2>");
            foreach (var operation in group)
            {
                Write(page, operation);
            }
        }

        return page.Append("</main></body></html>").ToString();
    }

    private static void Write(StringBuilder page, Operation operation)
    {
        var description = operation.Description;
        page.Append("<details id=\"").Append(Text(description.OperationId)).Append("\"><summary><code><b>").Append(Text(operation.Method)).Append("</b> ")
            .Append(Text(operation.Path)).Append("</code><span>").Append(Prose(description.Summary)).Append("</span></summary>");
        if (!string.IsNullOrEmpty(description.Description))
        {
            page.Append("<p>").Append(Prose(description.Description)).Append("</p>");
        }

        page.Append(description.Security is { Count: > 0 } ? "<p>Needs a token or a session.</p>" : "<p>Open to everybody.</p>");
        if (description.Parameters is { Count: > 0 } parameters)
        {
            page.Append("<h3>Parameters</h3><dl>");
            foreach (var parameter in parameters)
            {
                page.Append("<dt><code>").Append(Text(parameter.Name)).Append("</code> in the ").Append(Text(parameter.In.ToString())).Append(parameter.Required ? ", needed" : string.Empty)
                    .Append("</dt><dd>").Append(Prose(parameter.Description)).Append("</dd>");
            }

            page.Append("</dl>");
        }

        foreach (var (type, content) in description.RequestBody?.Content ?? new Dictionary<string, OpenApiMediaType>())
        {
            page.Append("<h3>Body, ").Append(Text(type)).Append("</h3>");
            WriteSchema(page, content.Schema, asked: true);
        }

        foreach (var (status, response) in description.Responses ?? [])
        {
            page.Append("<h3>").Append(Text(status)).Append(": ").Append(Text(response.Description)).Append("</h3>");
            if (status.StartsWith('2') && response.Content?.Values.FirstOrDefault() is { } content)
            {
                WriteSchema(page, content.Schema, asked: false);
            }
        }

        page.Append("</details>");
    }

    /// <summary>The members, as a list. What is asked for says which are needed; an answer has them all.</summary>
    private static void WriteSchema(StringBuilder page, IOpenApiSchema? schema, bool asked, int depth = 0)
    {
        if ((schema?.Items ?? Present(schema)) is { } inner)
        {
            // Of a list its elements, of a body that may be left out the body.
            WriteSchema(page, inner, asked, depth);
            return;
        }

        if (depth > DeepestSchema || schema?.Properties is not { Count: > 0 } properties)
        {
            return;
        }

        page.Append("<ul>");
        foreach (var (name, member) in properties)
        {
            page.Append("<li><code>").Append(Text(name)).Append("</code> ").Append(Text(TypeOf(member))).Append(asked && schema.Required?.Contains(name) == true ? ", needed" : string.Empty);
            if ((string.IsNullOrEmpty(member.Description) ? Present(member)?.Description : member.Description) is { Length: > 0 } said)
            {
                page.Append(". ").Append(Prose(said));
            }

            WriteSchema(page, member, asked, depth + 1);
            page.Append("</li>");
        }

        page.Append("</ul>");
    }

    /// <summary>What a schema that allows null is otherwise; null where it is not of that form.</summary>
    private static IOpenApiSchema? Present(IOpenApiSchema? schema) => schema?.OneOf?.FirstOrDefault(c => c.Type != JsonSchemaType.Null);

    private static string TypeOf(IOpenApiSchema schema)
    {
        if (Present(schema) is { } present)
        {
            return $"null or {TypeOf(present)}";
        }

        if (schema.Enum is { Count: > 0 } values)
        {
            return string.Join(" | ", values.Select(v => v?.ToString() ?? "null"));
        }

        var type = schema.Type is { } t ? string.Join(" or ", Enum.GetValues<JsonSchemaType>().Where(v => t.HasFlag(v)).Select(v => v.ToString())) : "object";
        return schema.Items is { } items ? $"list of {TypeOf(items)}" : WebName(type);
    }

#pragma warning disable CA1308 // words for people, not keys
    private static string WebName(string type) => type.ToLowerInvariant();
#pragma warning restore CA1308

    /// <summary>Text in which words between backticks are code.</summary>
    private static string Prose(string? text)
    {
        var parts = Text(text).Split('`');
        return parts.Length % 2 == 0
            ? string.Join('`', parts)
            : string.Concat(parts.Select((part, i) => i % 2 == 0 ? part : $"<code>{part}</code>"));
    }

    private static string Anchor(string heading) => Text(heading.Replace(' ', '-'));

    private static string Text(string? text) => WebUtility.HtmlEncode(text ?? string.Empty);

    private sealed record Operation(string Path, string Method, OpenApiOperation Description);
}
