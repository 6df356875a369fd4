using System.Net;
using Microsoft.AspNetCore.HttpOverrides;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Http;

/// <summary>Takes address, scheme and host of the caller from forwarded headers, but only from the proxies that the settings name.</summary>
public static class ForwardedAddresses
{
    /// <summary>Adds the step, where there are such proxies.</summary>
    public static void UseForwardedAddresses(this IApplicationBuilder app, ProxySettings proxies)
    {
        if (!proxies.Any)
        {
            return;
        }

        var options = new ForwardedHeadersOptions
        {
            ForwardedHeaders = ForwardedHeaders.XForwardedFor | ForwardedHeaders.XForwardedProto | ForwardedHeaders.XForwardedHost,
            ForwardLimit = proxies.Hops,
        };
        options.KnownProxies.Clear();
        options.KnownIPNetworks.Clear();
        foreach (var address in proxies.Addresses)
        {
            options.KnownProxies.Add(IPAddress.Parse(address));
        }

        foreach (var network in proxies.Networks)
        {
            options.KnownIPNetworks.Add(System.Net.IPNetwork.Parse(network));
        }

        app.UseForwardedHeaders(options);
    }
}
