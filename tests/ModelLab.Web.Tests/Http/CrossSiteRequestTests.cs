using System.Net;
using System.Text;
using ModelLab.Web.Http;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Http;

public sealed class CrossSiteRequestTests(SharedServer shared)
{
    [Theory]
    [InlineData("Sec-Fetch-Site", "cross-site", true)]
    [InlineData("Sec-Fetch-Site", "same-site", true)]
    [InlineData("Sec-Fetch-Site", "same-origin", false)]
    [InlineData("Sec-Fetch-Site", "none", false)]
    [InlineData("Origin", "https://elsewhere.example", true)]
    [InlineData("Origin", "null", true)]
    [InlineData("Origin", "http://localhost", false)]
    public async Task What_another_site_sends_is_not_carried_out(string header, string value, bool refused)
    {
        using var client = shared.Server.Anonymous();
        using var request = new HttpRequestMessage(HttpMethod.Post, "/sign-in") { Content = new StringContent("{", Encoding.UTF8, "application/json") };
        request.Headers.Add(header, value);
        using var answer = await client.SendAsync(request, TestContext.Current.CancellationToken);
        Assert.Equal(refused ? HttpStatusCode.Forbidden : HttpStatusCode.BadRequest, answer.StatusCode);
    }

    [Fact]
    public async Task A_token_is_not_sent_by_another_site_and_so_is_let_through()
    {
        using var request = new HttpRequestMessage(HttpMethod.Post, "/api/v1/projects") { Content = new StringContent("""{"name":"x","question":"y"}""", Encoding.UTF8, "application/json") };
        request.Headers.Add("Origin", "https://notebook.example");
        request.Headers.Authorization = shared.Client.DefaultRequestHeaders.Authorization;
        using var client = shared.Server.Anonymous();
        Assert.Equal(HttpStatusCode.Created, (await client.SendAsync(request, TestContext.Current.CancellationToken)).StatusCode);
    }

    [Theory]
    [InlineData("/health/live")]
    [InlineData("/api/v1/me")]
    [InlineData("/openapi/v1")]
    [InlineData("/nothing")]
    public async Task Every_answer_has_the_headers(string address)
    {
        using var client = shared.Server.Anonymous();
        using var answer = await client.FetchAsync(address);
        Assert.Equal(SecurityHeaders.ContentSecurityPolicy, answer.Headers.GetValues("Content-Security-Policy").Single());
        Assert.Equal("nosniff", answer.Headers.GetValues("X-Content-Type-Options").Single());
        Assert.Equal("DENY", answer.Headers.GetValues("X-Frame-Options").Single());
        Assert.Equal("no-referrer", answer.Headers.GetValues("Referrer-Policy").Single());
        Assert.True(answer.Headers.CacheControl!.NoStore);
        Assert.False(answer.Headers.Contains("Server"));
    }

    [Theory]
    [InlineData("https://localhost/health/live", true)]
    [InlineData("http://localhost/health/live", false)]
    public async Task Transport_security_is_asked_for_where_there_is_any(string address, bool asked)
    {
        using var client = shared.Server.Anonymous();
        using var answer = await client.FetchAsync(address);
        Assert.Equal(asked, answer.Headers.Contains("Strict-Transport-Security"));
    }

    [Fact]
    public void The_policy_for_content_allows_nothing_inline_and_nobody_else()
    {
        Assert.DoesNotContain("unsafe", SecurityHeaders.ContentSecurityPolicy, StringComparison.Ordinal);
        Assert.DoesNotContain("http", SecurityHeaders.ContentSecurityPolicy, StringComparison.Ordinal);
        Assert.StartsWith("default-src 'none'", SecurityHeaders.ContentSecurityPolicy, StringComparison.Ordinal);
    }
}
