using System.Text.Json;
using System.Xml.Linq;

namespace ModelLab.Architecture.Tests.Rules;

/// <summary>Package versions stand in one place, and every project has locked what it restores.</summary>
public static class PackageRule
{
    /// <summary>The central versions by package.</summary>
    public static IReadOnlyDictionary<string, string> CentralVersions(string packagesProps) => XDocument.Parse(packagesProps)
        .Descendants("PackageVersion")
        .ToDictionary(e => (string)e.Attribute("Include")!, e => (string)e.Attribute("Version")!, StringComparer.OrdinalIgnoreCase);

    /// <summary>Package references that carry a version of their own or have no central one.</summary>
    public static IEnumerable<string> OwnVersions(string path, string projectText, IReadOnlyDictionary<string, string> central)
    {
        foreach (var reference in XDocument.Parse(projectText).Descendants("PackageReference"))
        {
            var package = (string?)reference.Attribute("Include") ?? (string?)reference.Attribute("Update") ?? string.Empty;
            if (reference.Attribute("Version") is not null || reference.Attribute("VersionOverride") is not null
                || reference.Element("Version") is not null || reference.Element("VersionOverride") is not null)
            {
                yield return $"{path} gives {package} a version of its own";
            }

            if (!central.ContainsKey(package))
            {
                yield return $"{path} refers to {package}, which has no central version";
            }
        }
    }

    /// <summary>What is wrong with a project's lock file: it is missing, or does not hold what the project refers to at the central version.</summary>
    public static IEnumerable<string> LockFile(string path, string projectText, string? lockText, IReadOnlyDictionary<string, string> central)
    {
        if (lockText is null)
        {
            yield return $"{path} has no packages.lock.json beside it";
            yield break;
        }

        using var document = JsonDocument.Parse(lockText);
        var locked = document.RootElement.GetProperty("dependencies").EnumerateObject()
            .SelectMany(framework => framework.Value.EnumerateObject())
            .Where(p => p.Value.GetProperty("type").GetString() == "Direct")
            .GroupBy(p => p.Name, StringComparer.OrdinalIgnoreCase)
            .ToDictionary(g => g.Key, g => g.First().Value.GetProperty("resolved").GetString()!, StringComparer.OrdinalIgnoreCase);
        foreach (var package in XDocument.Parse(projectText).Descendants("PackageReference").Select(r => (string?)r.Attribute("Include")).OfType<string>())
        {
            if (!locked.TryGetValue(package, out var version))
            {
                yield return $"{path} refers to {package}, which its lock file does not hold";
            }
            else if (central.TryGetValue(package, out var wanted) && wanted != version)
            {
                yield return $"{path} has locked {package} {version} where {wanted} is central";
            }
        }
    }

    /// <summary>Projects that the solution does not list: they would be neither built nor tested.</summary>
    public static IEnumerable<string> OutsideSolution(IEnumerable<string> projects, string solutionText) => projects
        .Where(p => !solutionText.Contains('"' + p.Replace('/', '\\') + '"', StringComparison.Ordinal))
        .Select(p => $"{p} is not part of the solution");
}
