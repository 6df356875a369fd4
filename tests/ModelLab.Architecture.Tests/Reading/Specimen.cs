using Mono.Cecil;

namespace ModelLab.Architecture.Tests.Reading;

/// <summary>The deliberate violations that lie under Specimens/: types of this assembly that break a rule on purpose.</summary>
public static class Specimen
{
    private static readonly AssemblyDefinition Own = AssemblyDefinition.ReadAssembly(typeof(Specimen).Assembly.Location);

    /// <summary>The specimen as it was compiled.</summary>
    public static TypeDefinition Of(Type type) => Own.MainModule.GetType(type.FullName!.Replace('+', '/'))
        ?? throw new ArgumentException($"{type} is not compiled into the architecture tests.", nameof(type));
}
