using System.Net;
using System.Net.Sockets;

namespace ModelLab.Web.Features.SignIn;

/// <summary>The address a request comes from, as a key for counting.</summary>
public static class CallerAddress
{
    private const int SubscriberPrefixBytes = 8;

    /// <summary>An IPv4 address as it is; of an IPv6 address the first 64 bits, which one subscriber has for itself (common practice, after RFC 6177).</summary>
    public static string Of(HttpContext context) => Of(context.Connection.RemoteIpAddress);

    /// <summary>The key of an address.</summary>
    public static string Of(IPAddress? address)
    {
        if (address is null)
        {
            return "none";
        }

        if (address.IsIPv4MappedToIPv6)
        {
            address = address.MapToIPv4();
        }

        return address.AddressFamily == AddressFamily.InterNetworkV6 && !IPAddress.IsLoopback(address)
            ? Convert.ToHexString(address.GetAddressBytes().AsSpan(0, SubscriberPrefixBytes))
            : address.ToString();
    }
}
