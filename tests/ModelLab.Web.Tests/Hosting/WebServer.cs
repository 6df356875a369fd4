using System.Net;
using System.Net.Http.Headers;
using Microsoft.AspNetCore.Hosting;
using Microsoft.AspNetCore.Identity;
using Microsoft.AspNetCore.Mvc.Testing;
using Microsoft.AspNetCore.TestHost;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Time.Testing;
using ModelLab.Projects.People;
using ModelLab.Store.Accounts;
using ModelLab.Store.Server;
using ModelLab.Web.Startup;

namespace ModelLab.Web.Tests.Hosting;

/// <summary>The whole server in this process, on a data folder of its own, with a clock that stands still until it is moved.</summary>
public sealed class WebServer : WebApplicationFactory<Program>
{
    public const string Password = "quiet lantern over the weir";

    private readonly string folder = Directory.CreateTempSubdirectory("modellab-web-").FullName;

    public FakeTimeProvider Clock { get; } = new(new DateTimeOffset(2026, 3, 2, 9, 0, 0, TimeSpan.Zero));

    /// <summary>Settings under <c>ModelLab</c>, to be set before the first request.</summary>
    public Dictionary<string, string> Settings { get; } = [];

    /// <summary>Further services, to be set before the first request.</summary>
    public Action<IServiceCollection> MoreServices { get; set; } = _ => { };

    public string EnvironmentName { get; set; } = "Testing";

    public string DataFolder => folder;

    public static async Task<WebServer> StartAsync(Action<WebServer>? prepare = null)
    {
        var server = new WebServer();
        prepare?.Invoke(server);
        await server.Services.GetRequiredService<Readiness>().Done;
        return server;
    }

    /// <summary>Makes a person with an account and a password.</summary>
    public async Task<Person> PersonAsync(string name, bool administrator = false)
    {
        var records = Services.GetRequiredService<ServerRecords>();
        var invitation = await records.EnrolAsync(ServerRecords.CommandLineActor, name, EmailOf(name), administrator, CancellationToken.None);
        using var scope = Services.CreateScope();
        var hash = scope.ServiceProvider.GetRequiredService<IPasswordHasher<Account>>().HashPassword(null!, Password);
        return await records.AcceptInvitationAsync(invitation.Secret, hash, CancellationToken.None);
    }

    public static string EmailOf(string name) => $"{name.Split(' ')[0].ToUpperInvariant()}@example.org";

    public Task<IssuedToken> TokenAsync(Person person, TokenScope scope = TokenScope.Write, int days = 30) =>
        Services.GetRequiredService<ApiTokens>().IssueAsync(ServerRecords.CommandLineActor, person.Id, "test", scope, TimeSpan.FromDays(days), CancellationToken.None);

    /// <summary>A client that sends a person's token.</summary>
    public async Task<HttpClient> ClientAsync(Person person, TokenScope scope = TokenScope.Write) => ClientWith((await TokenAsync(person, scope)).Secret);

    /// <summary>A client that is signed in as a person, by cookie.</summary>
    public async Task<HttpClient> SignedInAsync(Person person)
    {
        var client = Anonymous();
        await client.PostJsonAsync("/sign-in", $$"""{"email":"{{person.Email}}","password":"{{Password}}"}""").JsonAsync(HttpStatusCode.OK);
        return client;
    }

    public HttpClient ClientWith(string token)
    {
        var client = Anonymous();
        client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", token);
        return client;
    }

    /// <summary>A client without a token that follows no redirection; it keeps cookies.</summary>
    public HttpClient Anonymous() => CreateClient(new WebApplicationFactoryClientOptions { AllowAutoRedirect = false });

    protected override void ConfigureWebHost(IWebHostBuilder builder)
    {
        builder.UseEnvironment(EnvironmentName);
        builder.UseSetting("ModelLab:DataFolder", folder);
        foreach (var (name, value) in Settings)
        {
            builder.UseSetting($"ModelLab:{name}", value);
        }

        builder.ConfigureTestServices(services =>
        {
            services.AddSingleton<TimeProvider>(Clock);
            MoreServices(services);
        });
    }

    protected override void Dispose(bool disposing)
    {
        base.Dispose(disposing);
        if (disposing && Directory.Exists(folder))
        {
            Microsoft.Data.Sqlite.SqliteConnection.ClearAllPools();
            Directory.Delete(folder, recursive: true);
        }
    }
}
