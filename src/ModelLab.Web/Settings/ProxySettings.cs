using System.ComponentModel.DataAnnotations;
using System.Net;

namespace ModelLab.Web.Settings;

/// <summary>Reverse proxies whose forwarded headers are believed: <c>ModelLab:Proxies</c>. None by default.</summary>
public sealed class ProxySettings : ISettings
{
    /// <summary>Addresses of the proxies.</summary>
    public IReadOnlyList<string> Addresses { get; set; } = [];

    /// <summary>Networks of the proxies, e.g. <c>10.0.0.0/8</c>.</summary>
    public IReadOnlyList<string> Networks { get; set; } = [];

    /// <summary>How many proxies stand one behind the other.</summary>
    [Range(1, 10)]
    public int Hops { get; set; } = 1;

    /// <summary>Whether any proxy is believed.</summary>
    public bool Any => Addresses.Count + Networks.Count > 0;

    /// <inheritdoc/>
    public IEnumerable<SettingProblem> Check()
    {
        foreach (var address in Addresses.Where(a => !IPAddress.TryParse(a, out _)))
        {
            yield return new SettingProblem(nameof(Addresses), $"holds '{address}', which is no IP address.");
        }

        foreach (var network in Networks.Where(n => !IPNetwork.TryParse(n, out _)))
        {
            yield return new SettingProblem(nameof(Networks), $"holds '{network}', which is no network such as 10.0.0.0/8.");
        }
    }
}
