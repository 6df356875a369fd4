using ModelLab.Architecture.Tests.Reading;

namespace ModelLab.Architecture.Tests.Rules;

/// <summary>Statistics computes and does nothing else: no files, network, storage, JSON, clock, process or ambient randomness.</summary>
public static class PureComputationRule
{
    private static readonly string[] Namespaces =
    [
        "System.IO", "System.Net", "System.Data", "System.Text.Json", "System.Xml", "System.Security.Cryptography", "System.Runtime.Serialization",
        "System.Timers", "Microsoft.AspNetCore", "Microsoft.Data", "Microsoft.EntityFrameworkCore", "Microsoft.Extensions",
    ];

    private static readonly HashSet<string> Types = new(StringComparer.Ordinal)
    {
        "System.Console", "System.DateTime", "System.DateTimeOffset", "System.DateOnly", "System.TimeOnly", "System.TimeProvider", "System.Random",
        "System.Guid", "System.Diagnostics.Process", "System.Diagnostics.Stopwatch", "System.Threading.Timer", "System.AppContext",
    };

    // Of the process's surroundings only the number of processors concerns a computation.
    private static readonly HashSet<string> EnvironmentMembers = new(StringComparer.Ordinal) { "get_ProcessorCount", "get_NewLine" };

    /// <summary>Uses that pure computation has no need of.</summary>
    public static IEnumerable<string> Violations(IEnumerable<TypeUse> uses) => uses
        .Where(u => Types.Contains(u.Type)
            || Namespaces.Any(n => u.Type.StartsWith(n + ".", StringComparison.Ordinal))
            || (u.Type == "System.Environment" && u.Member is not null && !EnvironmentMembers.Contains(u.Member)))
        .Select(u => $"{u.Place} uses {u.Type}{(u.Member is null ? string.Empty : "." + u.Member)}");
}
