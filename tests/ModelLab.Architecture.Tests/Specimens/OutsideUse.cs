using ModelLab.Ledger;

namespace ModelLab.Architecture.Tests.Specimens;

/// <summary>Uses a type of the ledger in each place where a use can hide.</summary>
public sealed class OutsideUse : IEquatable<Sha256Hash>
{
    private Sha256Hash inField;

    public Sha256Hash InSignature(IReadOnlyList<Sha256Hash> inGeneric) => inGeneric.Count > 0 ? inGeneric[0] : inField;

    public static string InBody() => default(Sha256Hash).ToString();

    public bool Equals(Sha256Hash other) => false;

    public override bool Equals(object? obj) => obj is Sha256Hash;

    public override int GetHashCode() => 0;

    public void Set(string text) => inField = Sha256Hash.Parse(text);
}
