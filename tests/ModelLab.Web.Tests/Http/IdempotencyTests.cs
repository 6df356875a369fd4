using System.Net;
using System.Text;
using Microsoft.EntityFrameworkCore;
using Microsoft.Extensions.DependencyInjection;
using ModelLab.Store;
using ModelLab.Web.Settings;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Http;

public sealed class IdempotencyTests(SharedServer shared)
{
    private const string Body = """{"name":"Sent twice","question":"Does it act once?"}""";

    [Fact]
    public async Task The_same_request_with_the_same_key_acts_once_and_is_answered_twice()
    {
        using var first = await shared.Client.PostJsonAsync("/api/v1/projects", Body, "key-1");
        using var second = await shared.Client.PostJsonAsync("/api/v1/projects", Body, "key-1");
        Assert.Equal(HttpStatusCode.Created, first.StatusCode);
        Assert.Equal(HttpStatusCode.Created, second.StatusCode);
        Assert.False(first.Headers.Contains("Idempotency-Replayed"));
        Assert.Equal("true", second.Headers.GetValues("Idempotency-Replayed").Single());
        Assert.Equal(first.Content.Headers.ContentType, second.Content.Headers.ContentType);
        Assert.Equal(await first.Content.ReadAsStringAsync(TestContext.Current.CancellationToken), await second.Content.ReadAsStringAsync(TestContext.Current.CancellationToken));
        var projects = (await shared.Client.FetchAsync("/api/v1/projects").JsonAsync(HttpStatusCode.OK)).AsArray();
        Assert.Single(projects, p => p!.Text("name") == "Sent twice");
    }

    [Fact]
    public async Task Another_request_with_the_same_key_is_refused()
    {
        await shared.Client.PostJsonAsync("/api/v1/projects", Body.Replace("twice", "once", StringComparison.Ordinal), "key-2").JsonAsync(HttpStatusCode.Created);
        var problem = await shared.Client.PostJsonAsync("/api/v1/projects", Body.Replace("twice", "otherwise", StringComparison.Ordinal), "key-2").ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal("keyReused", problem.Text("kind"));
        await shared.Client.PostJsonAsync("/api/v1/projects?x=1", Body.Replace("twice", "once", StringComparison.Ordinal), "key-2").ProblemAsync(HttpStatusCode.UnprocessableEntity);
    }

    [Fact]
    public async Task A_key_belongs_to_its_person()
    {
        var mine = await shared.Client.PostJsonAsync("/api/v1/projects", Body.Replace("twice", "by me", StringComparison.Ordinal), "key-3").JsonAsync(HttpStatusCode.Created);
        var theirs = await shared.StrangerClient.PostJsonAsync("/api/v1/projects", Body.Replace("twice", "by me", StringComparison.Ordinal), "key-3").JsonAsync(HttpStatusCode.Created);
        Assert.NotEqual(mine.Text("id"), theirs.Text("id"));
    }

    [Fact]
    public async Task A_refusal_is_given_again_and_what_never_came_to_the_act_is_not_kept()
    {
        using var first = await shared.Client.PostJsonAsync("/api/v1/projects", """{"name":"No question"}""", "key-4");
        using var second = await shared.Client.PostJsonAsync("/api/v1/projects", """{"name":"No question"}""", "key-4");
        Assert.Equal(HttpStatusCode.UnprocessableEntity, first.StatusCode);
        Assert.Equal(HttpStatusCode.UnprocessableEntity, second.StatusCode);
        Assert.True(second.Headers.Contains("Idempotency-Replayed"));

        await shared.Client.PostJsonAsync("/api/v1/projects", """{"name":1}""", "key-5").ProblemAsync(HttpStatusCode.BadRequest);
        await shared.Client.PostJsonAsync("/api/v1/projects", Body.Replace("twice", "after a slip", StringComparison.Ordinal), "key-5").JsonAsync(HttpStatusCode.Created);
    }

    [Fact]
    public async Task Two_at_once_with_one_key_act_once()
    {
        var body = Body.Replace("twice", "at once", StringComparison.Ordinal);
        var answers = await Task.WhenAll(Enumerable.Range(0, 6).Select(_ => shared.Client.PostJsonAsync("/api/v1/projects", body, "key-6")));
        Assert.Contains(answers, a => a.StatusCode == HttpStatusCode.Created);
        Assert.All(answers, a => Assert.True(a.StatusCode is HttpStatusCode.Created or HttpStatusCode.Conflict, $"{a.StatusCode}"));
        var projects = (await shared.Client.FetchAsync("/api/v1/projects").JsonAsync(HttpStatusCode.OK)).AsArray();
        Assert.Single(projects, p => p!.Text("name") == "Sent at once");
        using var later = await shared.Client.PostJsonAsync("/api/v1/projects", body, "key-6");
        Assert.Equal(HttpStatusCode.Created, later.StatusCode);
        Assert.True(later.Headers.Contains("Idempotency-Replayed"));
    }

    [Theory]
    [InlineData("two words")]
    [InlineData("ключ")]
    public async Task A_key_that_is_none_is_refused(string key)
    {
        using var request = new HttpRequestMessage(HttpMethod.Post, "/api/v1/projects") { Content = new StringContent(Body, Encoding.UTF8, "application/json") };
        request.Headers.TryAddWithoutValidation("Idempotency-Key", key);
        await shared.Client.SendAsync(request, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.BadRequest);
        await shared.Client.PostJsonAsync("/api/v1/projects", Body, new string('k', 201)).ProblemAsync(HttpStatusCode.BadRequest);
    }

    [Fact]
    public async Task An_upload_is_known_again_by_its_content()
    {
        var project = await shared.Client.OpenProjectAsync();
        var file = Encoding.UTF8.GetBytes("plot,yield\n1,2.5\n2,3.5\n3,4.5\n");
        var first = await shared.Client.UploadAsync(project, file, "key-7").JsonAsync(HttpStatusCode.Created);
        using var second = await shared.Client.UploadAsync(project, file, "key-7");
        Assert.True(second.Headers.Contains("Idempotency-Replayed"));
        Assert.Equal(first.Text("datasetId"), (await Task.FromResult(second).JsonAsync(HttpStatusCode.Created)).Text("datasetId"));
        file[^2] = (byte)'9';
        Assert.Equal("keyReused", (await shared.Client.UploadAsync(project, file, "key-7").ProblemAsync(HttpStatusCode.UnprocessableEntity)).Text("kind"));
        Assert.Single((await shared.Client.FetchAsync($"/api/v1/projects/{project}").JsonAsync(HttpStatusCode.OK))["datasets"]!.AsArray());
    }

    [Fact]
    public async Task A_secret_in_an_answer_does_not_lie_open_in_the_database()
    {
        const string Request = """{"name":"kept","scope":"read"}""";
        var issued = await shared.Session.PostJsonAsync("/api/v1/tokens", Request, "key-8").JsonAsync(HttpStatusCode.Created);
        await using var context = await shared.Server.Services.GetRequiredService<IDbContextFactory<ModelLabContext>>().CreateDbContextAsync(TestContext.Current.CancellationToken);
        var row = await context.IdempotencyRecords.SingleAsync(r => r.Key == "key-8", TestContext.Current.CancellationToken);
        Assert.DoesNotContain(issued.Text("secret"), Encoding.Latin1.GetString(row.Body), StringComparison.Ordinal);
        var again = await shared.Session.PostJsonAsync("/api/v1/tokens", Request, "key-8").JsonAsync(HttpStatusCode.Created);
        Assert.Equal(issued.Text("secret"), again.Text("secret"));
        var withToken = await shared.Client.PostJsonAsync("/api/v1/tokens", Request, "key-8").ProblemAsync(HttpStatusCode.Forbidden);
        Assert.Equal("sessionOnly", withToken.Text("kind"));
    }

    [Theory]
    [InlineData(null)]
    [InlineData("application/json")]
    public async Task A_body_that_is_no_upload_is_not_held_beyond_its_limit(string? type)
    {
        var project = await shared.Client.OpenProjectAsync();
        using var body = new ByteArrayContent(new byte[shared.Server.Services.GetRequiredService<StorageSettings>().MaximumRequestBytes + 1]);
        body.Headers.ContentType = type is null ? null : new(type);
        using var request = new HttpRequestMessage(HttpMethod.Post, type is null ? $"/api/v1/projects/{project}/sources" : "/api/v1/projects") { Content = body };
        request.Headers.Add("Idempotency-Key", $"key-9-{type?.Length}");
        Assert.Equal("tooLarge", (await shared.Client.SendAsync(request, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.RequestEntityTooLarge)).Text("kind"));
    }

    [Fact]
    public async Task A_file_of_another_name_is_another_request()
    {
        var project = await shared.Client.OpenProjectAsync();
        async Task<HttpResponseMessage> SendAsync(string fileName)
        {
            using var form = new MultipartFormDataContent { { new ByteArrayContent("plot,yield\n1,2.5\n2,3.5\n3,4.5\n"u8.ToArray()), "file", fileName } };
            using var request = new HttpRequestMessage(HttpMethod.Post, $"/api/v1/projects/{project}/sources") { Content = form };
            request.Headers.Add("Idempotency-Key", "key-10");
            return await shared.Client.SendAsync(request, TestContext.Current.CancellationToken);
        }

        await SendAsync("first.csv").JsonAsync(HttpStatusCode.Created);
        Assert.Equal("keyReused", (await SendAsync("second.csv").ProblemAsync(HttpStatusCode.UnprocessableEntity)).Text("kind"));
    }
}
