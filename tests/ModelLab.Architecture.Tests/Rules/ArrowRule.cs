using System.Xml.Linq;
using ModelLab.Architecture.Tests.Reading;
using Mono.Cecil;

namespace ModelLab.Architecture.Tests.Rules;

/// <summary>A room looks only into the rooms that it may: in its project file, in its compiled references, in each use of a type.</summary>
public static class ArrowRule
{
    private const string Prefix = "ModelLab.";

    /// <summary>Rooms under src/ that the house does not know.</summary>
    public static IEnumerable<string> UnknownRooms(IEnumerable<string> standing) =>
        standing.Where(room => !Rooms.Allowed.ContainsKey(room)).Select(room => $"{room} is no room of the house");

    /// <summary>Project references that point where the room may not look.</summary>
    public static IEnumerable<string> InProjectFile(string room, string projectText, IReadOnlySet<string> allowed) => XDocument.Parse(projectText)
        .Descendants("ProjectReference")
        .Select(r => Path.GetFileNameWithoutExtension(((string?)r.Attribute("Include") ?? string.Empty).Replace('\\', '/')))
        .Where(target => target.StartsWith(Prefix, StringComparison.Ordinal) && !allowed.Contains(target))
        .Select(target => $"{room}.csproj refers to {target}");

    /// <summary>Compiled assembly references that point where the room may not look.</summary>
    public static IEnumerable<string> InReferences(AssemblyDefinition assembly, IReadOnlySet<string> allowed) => assembly.Modules
        .SelectMany(m => m.AssemblyReferences)
        .Where(r => r.Name.StartsWith(Prefix, StringComparison.Ordinal) && !allowed.Contains(r.Name))
        .Select(r => $"{assembly.Name.Name} refers to {r.Name}");

    /// <summary>Uses of types that lie where the room may not look, each with its place.</summary>
    public static IEnumerable<string> InTypes(AssemblyDefinition assembly, IReadOnlySet<string> allowed) => TypeUses.Of(assembly)
        .Where(u => u.Assembly.StartsWith(Prefix, StringComparison.Ordinal) && !allowed.Contains(u.Assembly))
        .Select(u => $"{u.Place} uses {u.Type} of {u.Assembly}");
}
