using System.Net;
using Microsoft.Extensions.Time.Testing;
using ModelLab.Web.Features.SignIn;
using Xunit;

namespace ModelLab.Web.Tests.Features.SignIn;

public sealed class FailureCounterTests
{
    private readonly FakeTimeProvider clock = new();

    [Fact]
    public void A_key_is_locked_out_at_the_limit_and_others_are_not()
    {
        var counter = new FailureCounter(3, TimeSpan.FromMinutes(10), clock);
        counter.Failed("a");
        counter.Failed("a");
        Assert.Null(counter.LockedUntil("a"));
        counter.Failed("a");
        Assert.Equal(clock.GetUtcNow().AddMinutes(10), counter.LockedUntil("a"));
        Assert.Null(counter.LockedUntil("b"));
    }

    [Fact]
    public void A_lock_out_ends_and_counting_begins_anew()
    {
        var counter = new FailureCounter(2, TimeSpan.FromMinutes(10), clock);
        counter.Failed("a");
        counter.Failed("a");
        clock.Advance(TimeSpan.FromMinutes(10));
        Assert.Null(counter.LockedUntil("a"));
        counter.Failed("a");
        Assert.Null(counter.LockedUntil("a"));
    }

    [Fact]
    public void A_success_clears_the_count()
    {
        var counter = new FailureCounter(2, TimeSpan.FromMinutes(10), clock);
        counter.Failed("a");
        counter.Succeeded("a");
        counter.Failed("a");
        Assert.Null(counter.LockedUntil("a"));
    }

    [Theory]
    [InlineData("192.0.2.7", "192.0.2.7")]
    [InlineData("::ffff:192.0.2.7", "192.0.2.7")]
    [InlineData("2001:db8:1:2:3:4:5:6", "20010DB800010002")]
    [InlineData("2001:db8:1:2:ffff::1", "20010DB800010002")]
    [InlineData("::1", "::1")]
    public void An_address_is_counted_by_its_subscriber(string address, string key) => Assert.Equal(key, CallerAddress.Of(IPAddress.Parse(address)));
}
