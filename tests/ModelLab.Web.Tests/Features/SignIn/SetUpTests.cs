using System.Net;
using Microsoft.Extensions.DependencyInjection;
using ModelLab.Store.Server;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Features.SignIn;

public sealed class SetUpTests
{
    [Fact]
    public async Task The_set_up_token_makes_one_administrator_and_no_second()
    {
        await using var server = await WebServer.StartAsync();
        var token = await server.Services.GetRequiredService<ServerRecords>().CreateSetUpTokenAsync(TestContext.Current.CancellationToken);
        using var client = server.Anonymous();

        var wrong = await client.PostJsonAsync("/set-up", Body("set-up-guess")).ProblemAsync(HttpStatusCode.Forbidden);
        Assert.Equal("forbidden", wrong.Text("kind"));
        var weak = await client.PostJsonAsync("/set-up", Body(token!, password: "short")).ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal("password", weak["errors"]![0]!.Text("column"));
        Assert.Empty(await server.Services.GetRequiredService<ServerRecords>().PeopleAsync(TestContext.Current.CancellationToken));

        var person = await client.PostJsonAsync("/set-up", Body(token!)).JsonAsync(HttpStatusCode.Created);
        Assert.True(person["administrator"]!.GetValue<bool>());
        await client.PostJsonAsync("/set-up", Body(token!, email: "second@example.org")).ProblemAsync(HttpStatusCode.Forbidden);
        Assert.Null(await server.Services.GetRequiredService<ServerRecords>().CreateSetUpTokenAsync(TestContext.Current.CancellationToken));
        await client.PostJsonAsync("/sign-in", $$"""{"email":"first@example.org","password":"{{WebServer.Password}}"}""").JsonAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task An_invitation_sets_a_password_once()
    {
        await using var server = await WebServer.StartAsync();
        var administrator = await server.PersonAsync("Iris Vane", administrator: true);
        using var client = await server.ClientAsync(administrator);
        var invitation = await client.PostJsonAsync("/api/v1/people", """{"name":"Noor Field","email":"noor@example.org"}""").JsonAsync(HttpStatusCode.Created);
        var address = invitation.Text("address");
        using var anonymous = server.Anonymous();

        await anonymous.PostJsonAsync("/invitations/invite-guess", Password(WebServer.Password)).ProblemAsync(HttpStatusCode.Forbidden);
        await anonymous.PostJsonAsync(address, Password("noor@example.org")).ProblemAsync(HttpStatusCode.UnprocessableEntity);
        await anonymous.PostJsonAsync(address, Password(WebServer.Password)).JsonAsync(HttpStatusCode.OK);
        await anonymous.PostJsonAsync(address, Password("another long passphrase")).ProblemAsync(HttpStatusCode.Forbidden);
        await anonymous.PostJsonAsync("/sign-in", $$"""{"email":"Noor@Example.org","password":"{{WebServer.Password}}"}""").JsonAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task An_invitation_ends_with_its_time()
    {
        await using var server = await WebServer.StartAsync();
        var invitation = await server.Services.GetRequiredService<ServerRecords>().EnrolAsync(
            ServerRecords.CommandLineActor, "Late Comer", "late@example.org", false, TestContext.Current.CancellationToken);
        server.Clock.Advance(ServerRecords.InvitationLifetime);
        await server.Anonymous().PostJsonAsync($"/invitations/{invitation.Secret}", Password(WebServer.Password)).ProblemAsync(HttpStatusCode.Forbidden);
    }

    private static string Body(string token, string email = "first@example.org", string password = WebServer.Password) =>
        $$"""{"token":"{{token}}","email":"{{email}}","name":"First Person","password":"{{password}}"}""";

    private static string Password(string password) => $$"""{"password":"{{password}}"}""";
}
