using Mono.Cecil;

namespace ModelLab.Architecture.Tests.Rules;

/// <summary>What a public member takes and gives has names: no tuples, no tables of arrays whose places carry the meaning.</summary>
public static class NamedResultsRule
{
    /// <summary>Public or protected members of public types with a tuple in their signature, or an array of arrays, of several dimensions or of objects.</summary>
    public static IEnumerable<string> Violations(IEnumerable<TypeDefinition> types)
    {
        foreach (var type in types.Where(IsVisible))
        {
            foreach (var method in type.Methods.Where(m => m.IsPublic || m.IsFamily || m.IsFamilyOrAssembly))
            {
                foreach (var signature in method.Parameters.Select(p => p.ParameterType).Prepend(method.ReturnType))
                {
                    if (Fault(signature) is { } fault)
                    {
                        yield return $"{type.FullName}.{method.Name} has {fault} in its signature";
                    }
                }
            }

            foreach (var field in type.Fields.Where(f => f.IsPublic || f.IsFamily))
            {
                if (Fault(field.FieldType) is { } fault)
                {
                    yield return $"{type.FullName}.{field.Name} is {fault}";
                }
            }
        }
    }

    private static bool IsVisible(TypeDefinition type) => type.IsPublic || (type.IsNestedPublic && IsVisible(type.DeclaringType));

    private static string? Fault(TypeReference type) => type switch
    {
        GenericInstanceType generic when IsTuple(generic.ElementType) => "a tuple",
        GenericInstanceType generic => generic.GenericArguments.Select(Fault).FirstOrDefault(f => f is not null),
        ArrayType { Rank: > 1 } => "an array of several dimensions",
        ArrayType { ElementType: ArrayType } => "an array of arrays",
        ArrayType { ElementType.FullName: "System.Object" } => "an array of objects",
        TypeSpecification specification => Fault(specification.ElementType),
        _ => null,
    };

    private static bool IsTuple(TypeReference type) =>
        type.Namespace == "System" && (type.Name.StartsWith("ValueTuple`", StringComparison.Ordinal) || type.Name.StartsWith("Tuple`", StringComparison.Ordinal));
}
