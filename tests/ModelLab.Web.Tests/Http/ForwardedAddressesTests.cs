using System.Net;
using System.Text;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting;
using Microsoft.Extensions.DependencyInjection;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Http;

public sealed class ForwardedAddressesTests
{
    /// <summary>One attempt a minute is allowed for an address: a second caller behind the proxy gets through only if the proxy is believed.</summary>
    [Theory]
    [InlineData("Proxies:Addresses", "10.0.0.1", true)]
    [InlineData("Proxies:Networks", "10.0.0.0/8", true)]
    [InlineData("Proxies:Addresses", "10.0.0.2", false)]
    [InlineData("Proxies:Networks", "192.168.0.0/16", false)]
    [InlineData(null, null, false)]
    public async Task Only_the_proxies_of_the_settings_are_believed(string? setting, string? value, bool believed)
    {
        await using var server = await WebServer.StartAsync(s =>
        {
            s.Settings["SignIn:AttemptsPerMinute"] = "1";
            if (setting is not null)
            {
                s.Settings[setting] = value!;
            }

            s.MoreServices = services => services.AddTransient<IStartupFilter>(_ => new ComesFrom(IPAddress.Parse("10.0.0.1")));
        });
        using var client = server.Anonymous();
        Assert.Equal(HttpStatusCode.Unauthorized, await AttemptAsync(client, "203.0.113.5"));
        Assert.Equal(HttpStatusCode.TooManyRequests, await AttemptAsync(client, "203.0.113.5"));
        Assert.Equal(believed ? HttpStatusCode.Unauthorized : HttpStatusCode.TooManyRequests, await AttemptAsync(client, "203.0.113.6"));
    }

    [Fact]
    public async Task Of_several_forwarded_addresses_the_one_that_the_proxy_saw_counts()
    {
        await using var server = await WebServer.StartAsync(s =>
        {
            s.Settings["SignIn:AttemptsPerMinute"] = "1";
            s.Settings["Proxies:Addresses"] = "10.0.0.1";
            s.MoreServices = services => services.AddTransient<IStartupFilter>(_ => new ComesFrom(IPAddress.Parse("10.0.0.1")));
        });
        using var client = server.Anonymous();
        Assert.Equal(HttpStatusCode.Unauthorized, await AttemptAsync(client, "198.51.100.1, 203.0.113.5"));
        Assert.Equal(HttpStatusCode.TooManyRequests, await AttemptAsync(client, "198.51.100.2, 203.0.113.5"));
    }

    private static async Task<HttpStatusCode> AttemptAsync(HttpClient client, string forwarded)
    {
        using var request = new HttpRequestMessage(HttpMethod.Post, "/sign-in")
        {
            Content = new StringContent("""{"email":"nobody@example.org","password":"not the right words"}""", Encoding.UTF8, "application/json"),
        };
        request.Headers.Add("X-Forwarded-For", forwarded);
        using var answer = await client.SendAsync(request, TestContext.Current.CancellationToken);
        return answer.StatusCode;
    }

    private sealed class ComesFrom(IPAddress address) : IStartupFilter
    {
        public Action<IApplicationBuilder> Configure(Action<IApplicationBuilder> next) => app =>
        {
            app.Use((context, inner) =>
            {
                context.Connection.RemoteIpAddress = address;
                return inner(context);
            });
            next(app);
        };
    }
}
