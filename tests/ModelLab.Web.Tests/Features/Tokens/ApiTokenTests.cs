using System.Net;
using System.Net.Http.Headers;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Features.Tokens;

public sealed class ApiTokenTests(SharedServer shared)
{
    public static TheoryData<string, string> Writes => new()
    {
        { "POST", "/api/v1/projects" },
        { "POST", "/api/v1/tokens" },
        { "POST", "/api/v1/people" },
        { "PATCH", "/api/v1/people/x" },
        { "POST", "/api/v1/projects/x/sources" },
        { "PATCH", "/api/v1/projects/x/datasets/d/variables/v" },
        { "POST", "/api/v1/projects/x/preparations" },
        { "POST", "/api/v1/projects/x/paths" },
        { "POST", "/api/v1/projects/x/paths/a/decisions" },
        { "POST", "/api/v1/projects/x/paths/a/choose" },
        { "POST", "/api/v1/projects/x/paths/a/again" },
        { "POST", "/api/v1/projects/x/comments" },
        { "POST", "/api/v1/projects/x/findings/f/accept" },
        { "POST", "/api/v1/projects/x/people" },
        { "DELETE", "/api/v1/projects/x/people/y" },
    };

    [Theory]
    [MemberData(nameof(Writes))]
    public async Task A_token_of_read_scope_writes_nowhere(string method, string address)
    {
        using var request = new HttpRequestMessage(new HttpMethod(method), address) { Content = JsonBody() };
        var problem = await shared.ReadOnly.SendAsync(request, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.Forbidden);
        Assert.Equal("readOnlyToken", problem.Text("kind"));
    }

    [Theory]
    [MemberData(nameof(Writes))]
    public async Task Without_a_token_nothing_is_written(string method, string address)
    {
        using var client = shared.Server.Anonymous();
        using var request = new HttpRequestMessage(new HttpMethod(method), address) { Content = address.EndsWith("/sources", StringComparison.Ordinal) ? new MultipartFormDataContent() : JsonBody() };
        using var answer = await client.SendAsync(request, TestContext.Current.CancellationToken);
        Assert.Equal(HttpStatusCode.Unauthorized, answer.StatusCode);
        Assert.Equal("Bearer", answer.Headers.WwwAuthenticate.Single().Scheme);
    }

    [Theory]
    [InlineData("Bearer nonsense")]
    [InlineData("Bearer ml_AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA")]
    [InlineData("Basic dXNlcjpwYXNzd29yZA==")]
    [InlineData("Bearer")]
    public async Task A_token_that_is_none_is_refused(string header)
    {
        using var client = shared.Server.Anonymous();
        client.DefaultRequestHeaders.TryAddWithoutValidation("Authorization", header);
        using var answer = await client.FetchAsync("/api/v1/me");
        Assert.Equal(HttpStatusCode.Unauthorized, answer.StatusCode);
        Assert.Equal(new AuthenticationHeaderValue("Bearer", "error=\"invalid_token\""), answer.Headers.WwwAuthenticate.Single());
    }

    [Fact]
    public async Task A_token_of_read_scope_reads_verifies_and_replays()
    {
        var project = await shared.Client.OpenProjectAsync();
        await shared.ReadOnly.FetchAsync($"/api/v1/projects/{project}").JsonAsync(HttpStatusCode.OK);
        Assert.Equal("read", (await shared.ReadOnly.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK)).Text("scope"));
        var verified = await shared.ReadOnly.PostAsync($"/api/v1/projects/{project}/ledger/verify", null, TestContext.Current.CancellationToken).JsonAsync(HttpStatusCode.OK);
        Assert.True(verified["ok"]!.GetValue<bool>());
        var replayed = await shared.ReadOnly.PostAsync($"/api/v1/projects/{project}/replay", null, TestContext.Current.CancellationToken).JsonAsync(HttpStatusCode.OK);
        Assert.True(replayed["ok"]!.GetValue<bool>());
    }

    [Theory]
    [InlineData("")]
    [InlineData("/people")]
    [InlineData("/datasets/x")]
    [InlineData("/preparations")]
    [InlineData("/paths")]
    [InlineData("/comments")]
    [InlineData("/findings")]
    [InlineData("/ledger")]
    [InlineData("/ledger/receipt")]
    [InlineData("/revisions/x")]
    public async Task Of_somebody_elses_project_a_stranger_learns_nothing(string below)
    {
        var project = await shared.Client.OpenProjectAsync();
        var foreign = await shared.StrangerClient.FetchAsync($"/api/v1/projects/{project}{below}").ProblemAsync(HttpStatusCode.NotFound);
        var missing = await shared.StrangerClient.FetchAsync($"/api/v1/projects/no-such-project{below}").ProblemAsync(HttpStatusCode.NotFound);
        Assert.Equal(missing.Text("detail"), foreign.Text("detail"));
        Assert.DoesNotContain(
            (await shared.StrangerClient.FetchAsync("/api/v1/projects").JsonAsync(HttpStatusCode.OK)).AsArray(), p => p!.Text("id") == project);
    }

    [Fact]
    public async Task An_expired_token_is_refused()
    {
        await using var server = await WebServer.StartAsync();
        using var client = server.ClientWith((await server.TokenAsync(await server.PersonAsync("Ada Quill"), days: 1)).Secret);
        await client.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);
        server.Clock.Advance(TimeSpan.FromDays(1));
        await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
    }

    [Fact]
    public async Task A_disabled_persons_token_is_refused_and_works_again_when_enabled()
    {
        await using var server = await WebServer.StartAsync();
        var administrator = await server.ClientAsync(await server.PersonAsync("Iris Vane", administrator: true));
        var person = await server.PersonAsync("Ada Quill");
        using var client = await server.ClientAsync(person);
        await administrator.PatchJsonAsync($"/api/v1/people/{person.Id}", """{"active":false,"reason":"On leave."}""").JsonAsync(HttpStatusCode.OK);
        await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
        await administrator.PatchJsonAsync($"/api/v1/people/{person.Id}", """{"active":true,"reason":"Back."}""").JsonAsync(HttpStatusCode.OK);
        await client.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task A_person_issues_lists_and_revokes_own_tokens()
    {
        var issued = await shared.Session.PostJsonAsync("/api/v1/tokens", """{"name":"script","scope":"read","days":7}""").JsonAsync(HttpStatusCode.Created);
        using var client = shared.Server.ClientWith(issued.Text("secret"));
        await client.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);
        var listed = (await shared.Client.FetchAsync("/api/v1/tokens").JsonAsync(HttpStatusCode.OK)).AsArray();
        Assert.Contains(listed, t => t!.Text("id") == issued.Text("id") && t!.Text("name") == "script");
        Assert.DoesNotContain(issued.Text("secret"), listed.ToJsonString(), StringComparison.Ordinal);

        await shared.StrangerClient.DeleteAsync($"/api/v1/tokens/{issued.Text("id")}", TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.NotFound);
        var revoked = await shared.Client.DeleteAsync($"/api/v1/tokens/{issued.Text("id")}", TestContext.Current.CancellationToken).JsonAsync(HttpStatusCode.OK);
        Assert.NotNull(revoked["revokedAt"]);
        await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
    }

    [Fact]
    public async Task A_token_cannot_make_another()
    {
        const string Request = """{"name":"offspring","scope":"write"}""";
        var problem = await shared.Client.PostJsonAsync("/api/v1/tokens", Request).ProblemAsync(HttpStatusCode.Forbidden);
        Assert.Equal("sessionOnly", problem.Text("kind"));
        Assert.Contains("a token cannot make another", problem.Text("detail"), StringComparison.Ordinal);

        // A session beside the token does not help: the header decides who calls.
        using var both = await shared.Server.SignedInAsync(shared.Analyst);
        both.DefaultRequestHeaders.Authorization = shared.Client.DefaultRequestHeaders.Authorization;
        await both.PostJsonAsync("/api/v1/tokens", Request).ProblemAsync(HttpStatusCode.Forbidden);
        var listed = (await shared.Client.FetchAsync("/api/v1/tokens").JsonAsync(HttpStatusCode.OK)).AsArray();
        Assert.DoesNotContain(listed, t => t!.Text("name") == "offspring");
    }

    [Theory]
    [InlineData("""{"name":"x","scope":"read","days":0}""", "days")]
    [InlineData("""{"name":"x","scope":"read","days":367}""", "days")]
    [InlineData("""{"name":"  ","scope":"read"}""", "name")]
    public async Task A_token_that_cannot_be_is_refused_by_its_field(string body, string field)
    {
        var problem = await shared.Session.PostJsonAsync("/api/v1/tokens", body).ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal(field, problem["errors"]![0]!.Text("column"));
    }

    [Fact]
    public async Task Administration_is_for_administrators()
    {
        await shared.Client.FetchAsync("/api/v1/people").ProblemAsync(HttpStatusCode.Forbidden);
        await shared.Client.PostJsonAsync("/api/v1/people", """{"name":"X Y","email":"xy@example.org"}""").ProblemAsync(HttpStatusCode.Forbidden);
        await shared.Client.PatchJsonAsync($"/api/v1/people/{shared.Stranger.Id}", """{"active":false,"reason":"No."}""").ProblemAsync(HttpStatusCode.Forbidden);
    }

    private static StringContent JsonBody() => new("{}", System.Text.Encoding.UTF8, "application/json");
}
