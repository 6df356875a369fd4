using System.Net;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;
using ModelLab.Web.Features.Demo;
using ModelLab.Web.Startup;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Startup;

public sealed class HealthTests
{
    [Fact]
    public async Task The_server_is_alive_at_once_and_ready_only_after_the_demo()
    {
        var demo = new WaitingDemo();
        await using var server = new WebServer { EnvironmentName = "Development", MoreServices = s => s.AddSingleton<IDemoLoader>(demo) };
        var client = server.Anonymous();
        Assert.Equal(HttpStatusCode.OK, (await client.FetchAsync("/health/live")).StatusCode);
        await demo.Begun.Task.WaitAsync(TestContext.Current.CancellationToken);
        var waiting = await client.FetchAsync("/health/ready").JsonAsync(HttpStatusCode.ServiceUnavailable);
        Assert.Equal("making the demo project", waiting.Text("status"));
        var early = await client.FetchAsync("/api/v1/me").ProblemAsync(HttpStatusCode.ServiceUnavailable);
        Assert.Equal("notReady", early.Text("kind"));
        demo.MayEnd.SetResult();
        await server.Services.GetRequiredService<Readiness>().Done;
        Assert.Equal("ready", (await client.FetchAsync("/health/ready").JsonAsync(HttpStatusCode.OK)).Text("status"));
        Assert.Equal(HttpStatusCode.Unauthorized, (await client.FetchAsync("/api/v1/me")).StatusCode);
    }

    [Fact]
    public async Task The_demo_is_made_in_Development_only()
    {
        var demo = new WaitingDemo();
        demo.MayEnd.SetResult();
        await using var server = await WebServer.StartAsync(s => s.MoreServices = services => services.AddSingleton<IDemoLoader>(demo));
        Assert.False(demo.Begun.Task.IsCompleted);
    }

    [Fact]
    public async Task A_demo_that_fails_stops_the_server()
    {
        var demo = new WaitingDemo();
        await using var server = new WebServer { EnvironmentName = "Development", MoreServices = s => s.AddSingleton<IDemoLoader>(demo) };
        var readiness = server.Services.GetRequiredService<Readiness>();
        var stopping = server.Services.GetRequiredService<IHostApplicationLifetime>().ApplicationStopping;
        demo.MayEnd.SetException(new InvalidOperationException("no demo"));
        await Assert.ThrowsAsync<InvalidOperationException>(() => readiness.Done);
        Assert.False(readiness.IsReady);
        await Task.Delay(Timeout.Infinite, stopping).ContinueWith(_ => { }, TaskScheduler.Default).WaitAsync(TestContext.Current.CancellationToken);
    }

    private sealed class WaitingDemo : IDemoLoader
    {
        public TaskCompletionSource Begun { get; } = new();

        public TaskCompletionSource MayEnd { get; } = new();

        public Task LoadAsync(CancellationToken cancellation)
        {
            Begun.SetResult();
            return MayEnd.Task;
        }
    }
}
