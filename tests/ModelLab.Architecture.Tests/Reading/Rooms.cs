using Mono.Cecil;

namespace ModelLab.Architecture.Tests.Reading;

/// <summary>The rooms under src/ and into which others each may look.</summary>
public static class Rooms
{
    /// <summary>Allowed looks, by room. A room that is not listed here is not part of the house.</summary>
    public static IReadOnlyDictionary<string, IReadOnlySet<string>> Allowed { get; } = new Dictionary<string, IReadOnlySet<string>>
    {
        ["ModelLab.Statistics"] = Set(),
        ["ModelLab.Ledger"] = Set(),
        ["ModelLab.Intake"] = Set("Statistics"),
        ["ModelLab.Projects"] = Set("Statistics", "Ledger", "Intake"),
        ["ModelLab.Store"] = Set("Projects", "Ledger"),
        ["ModelLab.Store.Sqlite"] = Set("Store", "Projects", "Ledger"),
        ["ModelLab.Reports"] = Set("Projects"),
        ["ModelLab.Web"] = Set("Statistics", "Ledger", "Intake", "Projects", "Store", "Store.Sqlite", "Reports"),
        ["ModelLab.Verifier"] = Set("Projects"),
    };

    /// <summary>Names of the rooms that stand: those with a project under src/.</summary>
    public static IReadOnlyList<string> Standing { get; } =
        [.. RepositoryTree.Projects("src/").Select(p => Path.GetFileNameWithoutExtension(p.Path))];

    /// <summary>Reads the built assembly of a room that stands.</summary>
    public static AssemblyDefinition Open(string room)
    {
        var file = Path.Combine(AppContext.BaseDirectory, room + ".dll");
        return File.Exists(file)
            ? AssemblyDefinition.ReadAssembly(file)
            : throw new InvalidOperationException($"{room} stands under src/ but is not beside the architecture tests; let their project refer to it.");
    }

    private static HashSet<string> Set(params string[] rooms) => [.. rooms.Select(r => "ModelLab." + r)];
}
