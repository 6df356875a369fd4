using System.Net;
using Microsoft.Extensions.DependencyInjection;
using ModelLab.Store.Server;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Features.SignIn;

public sealed class SignInTests
{
    [Fact]
    public async Task A_session_works_until_signing_out()
    {
        await using var server = await WebServer.StartAsync();
        var person = await server.PersonAsync("Ada Quill");
        using var client = server.Anonymous();
        await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
        await SignInAsync(client).JsonAsync(HttpStatusCode.OK);
        var me = await client.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);
        Assert.Equal(person.Id, me["person"]!.Text("id"));
        Assert.Equal("write", me.Text("scope"));
        Assert.Null(me["expiresAt"]);
        Assert.Equal(HttpStatusCode.NoContent, (await client.PostAsync("/sign-out", null, TestContext.Current.CancellationToken)).StatusCode);
        await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
    }

    [Fact]
    public async Task The_keys_of_sessions_lie_where_nobody_else_looks()
    {
        if (OperatingSystem.IsWindows())
        {
            Assert.Skip("Windows has no such modes.");
            return;
        }

        const UnixFileMode Owner = UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute;
        await using var server = await WebServer.StartAsync(s => s.Settings["KeysFolder"] = Path.Combine(s.DataFolder, "apart"));
        await server.PersonAsync("Ada Quill");
        await SignInAsync(server.Anonymous()).JsonAsync(HttpStatusCode.OK);
        Assert.NotEmpty(Directory.GetFiles(Path.Combine(server.DataFolder, "apart", "sessions"), "key-*.xml"));
        Assert.Equal(Owner, File.GetUnixFileMode(Path.Combine(server.DataFolder, "apart")));
        Assert.Equal(Owner, File.GetUnixFileMode(Path.Combine(server.DataFolder, "apart", "sessions")));
    }

    [Fact]
    public async Task An_address_longer_than_any_is_wrong_and_counts()
    {
        await using var server = await WebServer.StartAsync(s => s.Settings["SignIn:FailuresPerAddress"] = "3");
        using var client = server.Anonymous();
        var body = $$"""{"email":"{{new string('a', 100_000)}}","password":"{{WebServer.Password}}"}""";
        for (var i = 0; i < 3; i++)
        {
            Assert.Equal("wrongPassword", (await client.PostJsonAsync("/sign-in", body).ProblemAsync(HttpStatusCode.Unauthorized)).Text("kind"));
        }

        Assert.Equal("lockedOut", (await client.PostJsonAsync("/sign-in", body).ProblemAsync(HttpStatusCode.TooManyRequests)).Text("kind"));
    }

    [Fact]
    public async Task The_cookie_is_out_of_reach_of_scripts_and_other_sites()
    {
        await using var server = await WebServer.StartAsync();
        await server.PersonAsync("Ada Quill");
        using var answer = await SignInAsync(server.Anonymous());
        var cookie = Assert.Single(answer.Headers.GetValues("Set-Cookie"));
        Assert.StartsWith("ModelLab.Session=", cookie, StringComparison.Ordinal);
        Assert.Contains("httponly", cookie, StringComparison.OrdinalIgnoreCase);
        Assert.Contains("samesite=lax", cookie, StringComparison.OrdinalIgnoreCase);
    }

    [Fact]
    public async Task A_session_ends_without_use_after_its_hours()
    {
        await using var server = await WebServer.StartAsync();
        await server.PersonAsync("Ada Quill");
        using var client = server.Anonymous();
        await SignInAsync(client).JsonAsync(HttpStatusCode.OK);
        server.Clock.Advance(TimeSpan.FromHours(12.1));
        await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
    }

    [Fact]
    public async Task A_session_in_use_ends_after_its_longest_time()
    {
        await using var server = await WebServer.StartAsync(s => s.Settings["SignIn:LongestSessionHours"] = "24");
        using var client = await server.SignedInAsync(await server.PersonAsync("Ada Quill"));
        for (var hours = 8; hours < 24; hours += 8)
        {
            server.Clock.Advance(TimeSpan.FromHours(8));
            using var answer = await client.FetchAsync("/api/v1/me");
            Assert.Equal(HttpStatusCode.OK, answer.StatusCode);
            Assert.True(answer.Headers.Contains("Set-Cookie"), "The cookie is renewed by use.");
        }

        server.Clock.Advance(TimeSpan.FromHours(8));
        await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
        await SignInAsync(client).JsonAsync(HttpStatusCode.OK);
        await client.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task Signing_out_ends_every_session_of_the_person_and_no_other()
    {
        await using var server = await WebServer.StartAsync();
        var person = await server.PersonAsync("Ada Quill");
        using var client = server.Anonymous();
        using var signedIn = await SignInAsync(client);
        var cookie = signedIn.Headers.GetValues("Set-Cookie").Single().Split(';')[0];
        using var elsewhere = await server.SignedInAsync(person);
        using var other = await server.SignedInAsync(await server.PersonAsync("Sten Marsh"));
        using var token = await server.ClientAsync(person);
        Assert.Equal(HttpStatusCode.OK, await WithCookieAsync(server, HttpMethod.Get, "/api/v1/me", cookie));

        // Whoever signs out with a token alone ends no session.
        Assert.Equal(HttpStatusCode.NoContent, (await token.PostAsync("/sign-out", null, TestContext.Current.CancellationToken)).StatusCode);
        await elsewhere.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);

        Assert.Equal(HttpStatusCode.NoContent, (await client.PostAsync("/sign-out", null, TestContext.Current.CancellationToken)).StatusCode);
        Assert.Equal(HttpStatusCode.Unauthorized, await WithCookieAsync(server, HttpMethod.Get, "/api/v1/me", cookie));
        await elsewhere.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
        await other.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);
        await token.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);

        // A dead cookie cannot end the sessions that came after it.
        using var later = await server.SignedInAsync(person);
        Assert.Equal(HttpStatusCode.NoContent, await WithCookieAsync(server, HttpMethod.Post, "/sign-out", cookie));
        await later.FetchAsync("/api/v1/me").JsonAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task Disabling_a_person_ends_the_session_at_once()
    {
        await using var server = await WebServer.StartAsync();
        var person = await server.PersonAsync("Ada Quill");
        using var client = server.Anonymous();
        await SignInAsync(client).JsonAsync(HttpStatusCode.OK);
        await server.Services.GetRequiredService<ServerRecords>().DisableAsync(ServerRecords.CommandLineActor, person.Id, "Left.", TestContext.Current.CancellationToken);
        await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.Unauthorized);
        var problem = await SignInAsync(server.Anonymous()).ProblemAsync(HttpStatusCode.Forbidden);
        Assert.Equal("disabled", problem.Text("kind"));
    }

    [Theory]
    [InlineData("o'brien@example.org")]
    [InlineData("zoë.müller@example.org")]
    public async Task An_address_may_hold_any_characters(string email)
    {
        await using var server = await WebServer.StartAsync();
        var invitation = await server.Services.GetRequiredService<ServerRecords>().EnrolAsync(
            ServerRecords.CommandLineActor, "Some Body", email, false, TestContext.Current.CancellationToken);
        using var client = server.Anonymous();
        await client.PostJsonAsync($"/invitations/{invitation.Secret}", $$"""{"password":"{{WebServer.Password}}"}""").JsonAsync(HttpStatusCode.OK);
        await SignInAsync(client, email, "not the right words").ProblemAsync(HttpStatusCode.Unauthorized);
        await SignInAsync(client, email).JsonAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task A_wrong_password_and_an_unknown_account_look_alike()
    {
        await using var server = await WebServer.StartAsync();
        await server.PersonAsync("Ada Quill");
        using var client = server.Anonymous();
        var wrong = await SignInAsync(client, password: "not the right words").ProblemAsync(HttpStatusCode.Unauthorized);
        var unknown = await SignInAsync(client, email: "nobody@example.org").ProblemAsync(HttpStatusCode.Unauthorized);
        Assert.Equal(wrong.Text("detail"), unknown.Text("detail"));
        Assert.Equal(wrong.Text("kind"), unknown.Text("kind"));
    }

    [Theory]
    [InlineData("ada@example.org")]
    [InlineData("nobody@example.org")]
    public async Task An_account_is_locked_out_after_five_failures_and_opens_again_with_time(string email)
    {
        await using var server = await WebServer.StartAsync();
        await server.PersonAsync("Ada Quill");
        using var client = server.Anonymous();
        for (var i = 0; i < 5; i++)
        {
            await SignInAsync(client, email, "not the right words").ProblemAsync(HttpStatusCode.Unauthorized);
        }

        var locked = await SignInAsync(client, email).ProblemAsync(HttpStatusCode.TooManyRequests);
        Assert.Equal("lockedOut", locked.Text("kind"));
        Assert.Contains("09:15 UTC", locked.Text("detail"), StringComparison.Ordinal);
        server.Clock.Advance(TimeSpan.FromMinutes(15));
        using var after = await SignInAsync(client, email);
        Assert.Equal(email.StartsWith("ada", StringComparison.Ordinal) ? HttpStatusCode.OK : HttpStatusCode.Unauthorized, after.StatusCode);
    }

    [Fact]
    public async Task Failures_side_by_side_are_all_counted()
    {
        await using var server = await WebServer.StartAsync();
        await server.PersonAsync("Ada Quill");
        using var client = server.Anonymous();
        var answers = await Task.WhenAll(Enumerable.Range(0, 8).Select(_ => SignInAsync(client, password: "not the right words")));
        Assert.Equal(5, answers.Count(a => a.StatusCode == HttpStatusCode.Unauthorized));
        Assert.Equal(3, answers.Count(a => a.StatusCode == HttpStatusCode.TooManyRequests));
    }

    [Fact]
    public async Task An_address_is_locked_out_whatever_the_accounts()
    {
        await using var server = await WebServer.StartAsync(s => s.Settings["SignIn:FailuresPerAddress"] = "6");
        await server.PersonAsync("Ada Quill");
        using var client = server.Anonymous();
        for (var i = 0; i < 6; i++)
        {
            await SignInAsync(client, $"guess{i}@example.org").ProblemAsync(HttpStatusCode.Unauthorized);
        }

        await SignInAsync(client).ProblemAsync(HttpStatusCode.TooManyRequests);
        server.Clock.Advance(TimeSpan.FromMinutes(15));
        await SignInAsync(client).JsonAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task Attempts_of_one_address_are_limited_by_the_minute()
    {
        await using var server = await WebServer.StartAsync(s => s.Settings["SignIn:AttemptsPerMinute"] = "2");
        using var client = server.Anonymous();
        await SignInAsync(client).ProblemAsync(HttpStatusCode.Unauthorized);
        await SignInAsync(client).ProblemAsync(HttpStatusCode.Unauthorized);
        using var third = await SignInAsync(client);
        Assert.Equal(HttpStatusCode.TooManyRequests, third.StatusCode);
        Assert.Equal("60", third.Headers.GetValues("Retry-After").Single());
        Assert.Equal(HttpStatusCode.OK, (await client.FetchAsync("/health/ready")).StatusCode);
    }

    [Fact]
    public async Task A_form_leads_on_to_an_address_of_this_server_only()
    {
        await using var server = await WebServer.StartAsync();
        await server.PersonAsync("Ada Quill");
        Assert.Equal("/projects/1", await LedToAsync(server, "/projects/1"));
        foreach (var elsewhere in new[] { "//evil.example/x", "/\\evil.example", "https://evil.example", "javascript:alert(1)", "/\tx", "" })
        {
            Assert.Equal("/", await LedToAsync(server, elsewhere));
        }
    }

    [Fact]
    public async Task A_form_that_is_refused_leads_back_to_the_page()
    {
        await using var server = await WebServer.StartAsync();
        using var answer = await server.Anonymous().PostAsync(
            "/sign-in?returnUrl=/projects/1", new FormUrlEncodedContent([new("email", "x@example.org"), new("password", "wrong words here")]), TestContext.Current.CancellationToken);
        Assert.Equal("/sign-in?refused=Wrong&returnUrl=%2Fprojects%2F1", answer.Headers.Location?.OriginalString);
    }

    [Fact]
    public async Task A_form_without_a_field_is_refused_by_its_name()
    {
        await using var server = await WebServer.StartAsync();
        var problem = await server.Anonymous().PostAsync("/sign-in", new FormUrlEncodedContent([new("email", "x@example.org")]), TestContext.Current.CancellationToken)
            .ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal("password", problem["errors"]![0]!.Text("column"));
    }

    private static async Task<HttpStatusCode> WithCookieAsync(WebServer server, HttpMethod method, string address, string cookie)
    {
        using var client = server.CreateClient(new() { AllowAutoRedirect = false, HandleCookies = false });
        using var request = new HttpRequestMessage(method, address);
        request.Headers.Add("Cookie", cookie);
        using var answer = await client.SendAsync(request, TestContext.Current.CancellationToken);
        return answer.StatusCode;
    }

    private static async Task<string?> LedToAsync(WebServer server, string returnUrl)
    {
        using var client = server.Anonymous();
        using var answer = await client.PostAsync(
            $"/sign-in?returnUrl={Uri.EscapeDataString(returnUrl)}",
            new FormUrlEncodedContent([new("email", "ada@example.org"), new("password", WebServer.Password)]),
            TestContext.Current.CancellationToken);
        Assert.Equal(HttpStatusCode.Redirect, answer.StatusCode);
        return answer.Headers.Location?.OriginalString;
    }

    private static Task<HttpResponseMessage> SignInAsync(HttpClient client, string email = "ada@example.org", string password = WebServer.Password) =>
        client.PostJsonAsync("/sign-in", $$"""{"email":"{{email}}","password":"{{password}}"}""");
}
