using Mono.Cecil;
using Mono.Cecil.Cil;

namespace ModelLab.Architecture.Tests.Reading;

/// <summary>Finds every use of a type from another assembly: in bases, signatures, attributes and method bodies.</summary>
public static class TypeUses
{
    /// <summary>All uses in an assembly, each once.</summary>
    public static IReadOnlyList<TypeUse> Of(AssemblyDefinition assembly) => [.. assembly.Modules
        .SelectMany(m => m.GetTypes())
        .SelectMany(OfType)
        .Concat(OfAttributes(assembly, assembly.Name.Name))
        .Distinct()];

    /// <summary>All uses in one type, without those of types nested in it.</summary>
    public static IEnumerable<TypeUse> OfType(TypeDefinition type)
    {
        var place = type.FullName;
        return From(type.BaseType, place, null)
            .Concat(type.Interfaces.SelectMany(i => From(i.InterfaceType, place, null)))
            .Concat(type.GenericParameters.SelectMany(g => g.Constraints).SelectMany(c => From(c.ConstraintType, place, null)))
            .Concat(OfAttributes(type, place))
            .Concat(type.Fields.SelectMany(f => From(f.FieldType, $"{place}.{f.Name}", null).Concat(OfAttributes(f, $"{place}.{f.Name}"))))
            .Concat(type.Properties.SelectMany(p => OfAttributes(p, $"{place}.{p.Name}")))
            .Concat(type.Methods.SelectMany(m => OfMethod(m, $"{place}.{m.Name}")));
    }

    private static IEnumerable<TypeUse> OfMethod(MethodDefinition method, string place)
    {
        var signature = From(method.ReturnType, place, null)
            .Concat(method.Parameters.SelectMany(p => From(p.ParameterType, place, null)))
            .Concat(method.GenericParameters.SelectMany(g => g.Constraints).SelectMany(c => From(c.ConstraintType, place, null)))
            .Concat(OfAttributes(method, place));
        return method.HasBody
            ? signature
                .Concat(method.Body.Variables.SelectMany(v => From(v.VariableType, place, null)))
                .Concat(method.Body.ExceptionHandlers.SelectMany(h => From(h.CatchType, place, null)))
                .Concat(method.Body.Instructions.SelectMany(i => OfInstruction(i, place)))
            : signature;
    }

    private static IEnumerable<TypeUse> OfInstruction(Instruction instruction, string place) => instruction.Operand switch
    {
        TypeReference type => From(type, place, null),
        FieldReference field => From(field.DeclaringType, place, field.Name).Concat(From(field.FieldType, place, null)),
        MethodReference method => From(method.DeclaringType, place, method.Name)
            .Concat(From(method.ReturnType, place, null))
            .Concat(method.Parameters.SelectMany(p => From(p.ParameterType, place, null)))
            .Concat(method is GenericInstanceMethod generic ? generic.GenericArguments.SelectMany(a => From(a, place, null)) : []),
        _ => [],
    };

    private static IEnumerable<TypeUse> OfAttributes(ICustomAttributeProvider provider, string place) =>
        provider.CustomAttributes.SelectMany(a => From(a.AttributeType, place, null));

    // Takes a type apart down to the named types in it: arrays, references, generic arguments.
    private static IEnumerable<TypeUse> From(TypeReference? type, string place, string? member) => type switch
    {
        null or GenericParameter => [],
        GenericInstanceType generic => From(generic.ElementType, place, member).Concat(generic.GenericArguments.SelectMany(a => From(a, place, null))),
        FunctionPointerType pointer => From(pointer.ReturnType, place, null).Concat(pointer.Parameters.SelectMany(p => From(p.ParameterType, place, null))),
        RequiredModifierType modified => From(modified.ElementType, place, member).Concat(From(modified.ModifierType, place, null)),
        TypeSpecification specification => From(specification.ElementType, place, member),
        _ => OutermostScope(type) is AssemblyNameReference assembly ? [new TypeUse(place, type.FullName, assembly.Name, member)] : [],
    };

    private static IMetadataScope OutermostScope(TypeReference type) => type.DeclaringType is null ? type.Scope : OutermostScope(type.DeclaringType);
}
