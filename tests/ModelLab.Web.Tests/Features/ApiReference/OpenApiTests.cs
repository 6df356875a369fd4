using System.Net;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Features.ApiReference;

public sealed class OpenApiTests(SharedServer shared)
{
    private static readonly string[] Methods = ["get", "post", "patch", "put", "delete"];

    [Fact]
    public async Task Every_endpoint_of_the_API_is_described()
    {
        var document = await DocumentAsync();
        var described = Operations(document).Select(o => $"{o.Method} {o.Path}").ToHashSet(StringComparer.Ordinal);
        var mapped = shared.Server.Services.GetRequiredService<EndpointDataSource>().Endpoints.OfType<RouteEndpoint>()
            .Where(e => e.RoutePattern.RawText!.TrimStart('/').StartsWith("api/", StringComparison.Ordinal))
            .SelectMany(e => e.Metadata.GetMetadata<HttpMethodMetadata>()!.HttpMethods.Select(m => $"{m.ToLowerInvariant()} /{e.RoutePattern.RawText!.Trim('/')}"))
            .ToList();
        Assert.True(mapped.Count >= 30, $"Only {mapped.Count} endpoints were found.");
        Assert.All(mapped, m => Assert.Contains(m, described));
    }

    [Fact]
    public async Task Every_operation_has_a_summary_a_name_and_described_answers()
    {
        var offenders = new List<string>();
        foreach (var operation in Operations(await DocumentAsync()))
        {
            var name = $"{operation.Method} {operation.Path}";
            if (operation.Node["summary"]?.GetValue<string>() is not { Length: > 10 } summary || !summary.Contains('.', StringComparison.Ordinal))
            {
                offenders.Add($"{name} has no summary");
            }

            if (operation.Node["operationId"] is null)
            {
                offenders.Add($"{name} has no name");
            }

            var answers = operation.Node["responses"]!.AsObject();
            var good = answers.Where(a => a.Key.StartsWith('2')).ToList();
            if (good.Count == 0 || good.Any(a => a.Key != "204" && a.Value!["content"] is null))
            {
                offenders.Add($"{name} does not describe what it gives");
            }

            if (operation.Path.StartsWith("/api/", StringComparison.Ordinal) && (answers["401"] is null || operation.Node["security"] is not JsonArray { Count: > 0 }))
            {
                offenders.Add($"{name} does not say that it needs a token");
            }

            if (operation.Path.Contains("{project}", StringComparison.Ordinal) && answers["404"] is null)
            {
                offenders.Add($"{name} does not describe 404");
            }

            if (operation.Method is "post" or "patch" && operation.Node["requestBody"] is not null && answers["400"] is null)
            {
                offenders.Add($"{name} takes a body and does not describe 400");
            }

            foreach (var answer in answers.Where(a => a.Key[0] is '4' or '5'))
            {
                if (answer.Value!["content"]?["application/problem+json"] is null && !operation.Path.StartsWith("/health", StringComparison.Ordinal))
                {
                    offenders.Add($"{name} answers {answer.Key} with no problem");
                }
            }
        }

        Assert.Empty(offenders);
    }

    [Fact]
    public async Task Everything_that_is_open_to_everybody_is_listed_here()
    {
        await Task.CompletedTask;
        var open = shared.Server.Services.GetRequiredService<EndpointDataSource>().Endpoints.OfType<RouteEndpoint>()
            .Where(e => e.Metadata.GetMetadata<IAuthorizeData>() is null || e.Metadata.GetMetadata<IAllowAnonymous>() is not null)
            .Select(e => "/" + e.RoutePattern.RawText!.Trim('/'))
            .Distinct()
            .Order(StringComparer.Ordinal);
        Assert.Equal(
            ["/health/live", "/health/ready", "/invitations/{token}", "/openapi", "/openapi/reference.css", "/openapi/v1", "/openapi/{documentName}.json", "/set-up", "/sign-in", "/sign-out"],
            open);
    }

    [Fact]
    public async Task Terms_hashes_and_choices_are_described_as_they_are_written()
    {
        var document = await DocumentAsync();
        var text = document.ToJsonString();
        Assert.Contains("^[0-9a-f]{64}$", text, StringComparison.Ordinal);
        Assert.Contains("excludeRows", text, StringComparison.Ordinal);
        Assert.Contains("\"degree\"", text, StringComparison.Ordinal);
        Assert.DoesNotContain("canonicalBytes", text, StringComparison.Ordinal);
    }

    [Fact]
    public async Task The_page_names_the_values_of_choices_and_the_members_of_bodies_that_may_be_left_out()
    {
        var page = await shared.Client.GetStringAsync("/openapi/v1", TestContext.Current.CancellationToken);
        Assert.Contains("<code>cause</code> null or recordingError | outsidePopulation | duplicate | influence | other", page, StringComparison.Ordinal);
        Assert.Contains("<code>receipts</code> list of object. The files as they were received", page, StringComparison.Ordinal);
        Assert.DoesNotContain("<code>cause</code> object", page, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Every_member_of_every_schema_has_a_type()
    {
        var offenders = new List<string>();
        foreach (var (name, schema) in (await DocumentAsync())["components"]!["schemas"]!.AsObject())
        {
            Walk(name, schema!.AsObject(), offenders);
        }

        Assert.Empty(offenders);
    }

    [Theory]
    [InlineData("StartRequest", null)]
    [InlineData("PersonChange", "active,reason")]
    [InlineData("TokenRequest", "name,scope")]
    [InlineData("RuleRecord", "direction,criterion")]
    public async Task What_may_be_left_out_is_not_called_needed(string schema, string? needed)
    {
        var described = (await DocumentAsync())["components"]!["schemas"]![schema]!;
        Assert.Equal(needed ?? string.Empty, string.Join(',', described["required"]?.AsArray().Select(r => r!.GetValue<string>()) ?? []));
    }

    [Fact]
    public async Task The_page_shows_every_operation_and_asks_nobody_else()
    {
        using var client = shared.Server.Anonymous();
        using var answer = await client.FetchAsync("/openapi/v1");
        var page = await answer.Content.ReadAsStringAsync(TestContext.Current.CancellationToken);
        Assert.Equal("text/html", answer.Content.Headers.ContentType?.MediaType);
        foreach (var operation in Operations(await DocumentAsync()))
        {
            Assert.Contains($"id=\"{operation.Node["operationId"]!.GetValue<string>()}\"", page, StringComparison.Ordinal);
        }

        Assert.DoesNotContain("<script", page, StringComparison.Ordinal);
        Assert.DoesNotContain("style=", page, StringComparison.Ordinal);
        Assert.DoesNotContain("http://", page, StringComparison.Ordinal);
        Assert.DoesNotContain("https://", page, StringComparison.Ordinal);
        using var style = await client.FetchAsync("/openapi/reference.css");
        Assert.Equal("text/css", style.Content.Headers.ContentType?.MediaType);
        Assert.DoesNotContain("url(", await style.Content.ReadAsStringAsync(TestContext.Current.CancellationToken), StringComparison.Ordinal);
    }

    private async Task<JsonNode> DocumentAsync()
    {
        using var client = shared.Server.Anonymous();
        return await client.FetchAsync("/openapi/v1.json").JsonAsync(HttpStatusCode.OK);
    }

    private static IEnumerable<Operation> Operations(JsonNode document) =>
        document["paths"]!.AsObject().SelectMany(p => p.Value!.AsObject().Where(o => Methods.Contains(o.Key)).Select(o => new Operation(p.Key, o.Key, o.Value!)));

    private static void Walk(string place, JsonObject schema, List<string> offenders)
    {
        if (schema["$ref"] is not null)
        {
            return;
        }

        var choices = (schema["oneOf"] ?? schema["anyOf"])?.AsArray();
        if (schema["type"] is null && choices is null && schema["enum"] is null)
        {
            offenders.Add($"{place} has no type");
        }

        var types = schema["type"] is JsonArray several ? several.Select(t => t!.GetValue<string>()).ToList() : [schema["type"]?.GetValue<string>() ?? string.Empty];
        if (types.Contains("array") && schema["items"] is null)
        {
            offenders.Add($"{place} does not say what it lists");
        }

        if (schema["items"] is JsonObject items)
        {
            Walk($"{place}[]", items, offenders);
        }

        foreach (var choice in choices ?? [])
        {
            Walk(place, choice!.AsObject(), offenders);
        }

        foreach (var (name, member) in schema["properties"]?.AsObject() ?? [])
        {
            Walk($"{place}.{name}", member!.AsObject(), offenders);
        }
    }

    private sealed record Operation(string Path, string Method, JsonNode Node);
}
