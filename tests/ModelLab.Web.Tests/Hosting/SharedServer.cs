using ModelLab.Projects.People;
using ModelLab.Store.Server;
using Xunit;

[assembly: AssemblyFixture(typeof(ModelLab.Web.Tests.Hosting.SharedServer))]

namespace ModelLab.Web.Tests.Hosting;

/// <summary>One server for all tests that neither move its clock nor change its people.</summary>
public sealed class SharedServer : IAsyncLifetime
{
    public WebServer Server { get; private set; } = null!;

    public Person Analyst { get; private set; } = null!;

    public Person Stranger { get; private set; } = null!;

    /// <summary>Of the analyst, who owns what the tests open.</summary>
    public HttpClient Client { get; private set; } = null!;

    /// <summary>Of the analyst, signed in by cookie.</summary>
    public HttpClient Session { get; private set; } = null!;

    public HttpClient ReadOnly { get; private set; } = null!;

    public HttpClient StrangerClient { get; private set; } = null!;

    public async ValueTask InitializeAsync()
    {
        Server = await WebServer.StartAsync();
        Analyst = await Server.PersonAsync("Ada Quill");
        Stranger = await Server.PersonAsync("Sten Marsh");
        Client = await Server.ClientAsync(Analyst);
        Session = await Server.SignedInAsync(Analyst);
        ReadOnly = await Server.ClientAsync(Analyst, TokenScope.Read);
        StrangerClient = await Server.ClientAsync(Stranger);
    }

    public async ValueTask DisposeAsync() => await Server.DisposeAsync();
}
