using System.Net;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json.Nodes;
using Xunit;

namespace ModelLab.Web.Tests.Hosting;

/// <summary>Sending and reading JSON in tests.</summary>
public static class Answers
{
    public static Task<HttpResponseMessage> PostJsonAsync(this HttpClient client, string address, string json, string? key = null)
    {
        var request = new HttpRequestMessage(HttpMethod.Post, address) { Content = new StringContent(json, Encoding.UTF8, "application/json") };
        if (key is not null)
        {
            request.Headers.Add("Idempotency-Key", key);
        }

        return client.SendAsync(request, TestContext.Current.CancellationToken);
    }

    public static Task<HttpResponseMessage> PatchJsonAsync(this HttpClient client, string address, string json) =>
        client.PatchAsync(address, new StringContent(json, Encoding.UTF8, "application/json"), TestContext.Current.CancellationToken);

    public static Task<HttpResponseMessage> FetchAsync(this HttpClient client, string address) => client.GetAsync(address, TestContext.Current.CancellationToken);

    /// <summary>The body as JSON, after a check of the status.</summary>
    public static async Task<JsonNode> JsonAsync(this Task<HttpResponseMessage> sending, HttpStatusCode status)
    {
        using var answer = await sending;
        var text = await answer.Content.ReadAsStringAsync(TestContext.Current.CancellationToken);
        Assert.True(answer.StatusCode == status, $"{(int)answer.StatusCode} instead of {(int)status}: {text}");
        return JsonNode.Parse(text)!;
    }

    /// <summary>The problem of a refused request, after a check of what every problem has.</summary>
    public static async Task<JsonNode> ProblemAsync(this Task<HttpResponseMessage> sending, HttpStatusCode status)
    {
        using var answer = await sending;
        var text = await answer.Content.ReadAsStringAsync(TestContext.Current.CancellationToken);
        Assert.True(answer.StatusCode == status, $"{(int)answer.StatusCode} instead of {(int)status}: {text}");
        Assert.Equal("application/problem+json", answer.Content.Headers.ContentType?.MediaType);
        var problem = JsonNode.Parse(text)!;
        Assert.Equal((int)status, problem["status"]!.GetValue<int>());
        Assert.NotEmpty(problem["title"]!.GetValue<string>());
        Assert.NotEmpty(problem["detail"]!.GetValue<string>());
        Assert.NotEmpty(problem["kind"]!.GetValue<string>());
        Assert.NotEmpty(problem["traceId"]!.GetValue<string>());
        Assert.DoesNotContain("ModelLab.", text, StringComparison.Ordinal);
        Assert.DoesNotContain("   at ", text, StringComparison.Ordinal);
        return problem;
    }

    public static string Text(this JsonNode node, string name) => node[name]!.GetValue<string>();

    public static async Task<string> OpenProjectAsync(this HttpClient client, string name = "Marsh drainage") =>
        (await client.PostAsJsonAsync("/api/v1/projects", new { name, question = "Does drainage change the yield?" }, TestContext.Current.CancellationToken)
            .JsonAsync(HttpStatusCode.Created)).Text("id");

    public static Task<HttpResponseMessage> UploadAsync(this HttpClient client, string project, byte[] file, string? key = null, params (string Name, string Value)[] fieldsAfter)
    {
        var form = new MultipartFormDataContent { { new ByteArrayContent(file), "file", "plots.csv" } };
        foreach (var (name, value) in fieldsAfter)
        {
            form.Add(new StringContent(value), name);
        }

        var request = new HttpRequestMessage(HttpMethod.Post, $"/api/v1/projects/{project}/sources") { Content = form };
        if (key is not null)
        {
            request.Headers.Add("Idempotency-Key", key);
        }

        return client.SendAsync(request, TestContext.Current.CancellationToken);
    }
}
