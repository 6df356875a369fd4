namespace ModelLab.Architecture.Tests.Reading;

/// <summary>One place in an assembly that makes use of a type.</summary>
/// <param name="Place">Type and member that use it.</param>
/// <param name="Type">Full name of the type used.</param>
/// <param name="Assembly">Assembly that the type comes from.</param>
/// <param name="Member">Name of the method or field used, or null where the type alone is named.</param>
public sealed record TypeUse(string Place, string Type, string Assembly, string? Member);
