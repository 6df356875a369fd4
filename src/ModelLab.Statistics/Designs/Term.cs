namespace ModelLab.Statistics.Designs;

/// <summary>What enters or leaves a model as one. Terms are equal when their texts are.</summary>
public abstract class Term : IEquatable<Term>
{
    /// <summary>The term as people and the HTTP API read it: <c>x</c>, <c>x^2</c>; names outside letters, digits and underscore are quoted.</summary>
    public abstract string Text { get; }

    /// <summary>Names of the variables that it is made of.</summary>
    public abstract IReadOnlyList<string> Variables { get; }

    /// <inheritdoc/>
    public bool Equals(Term? other) => other is not null && string.Equals(Text, other.Text, StringComparison.Ordinal);

    /// <inheritdoc/>
    public sealed override bool Equals(object? obj) => Equals(obj as Term);

    /// <inheritdoc/>
    public sealed override int GetHashCode() => StringComparer.Ordinal.GetHashCode(Text);

    /// <inheritdoc/>
    public sealed override string ToString() => Text;

    /// <summary>Quotes a variable's name where it holds anything but letters, digits and underscores.</summary>
    protected static string Quote(string name)
    {
        var plain = name.Length > 0 && !char.IsDigit(name[0]);
        foreach (var c in name)
        {
            plain &= char.IsLetterOrDigit(c) || c == '_';
        }

        return plain ? name : "\"" + name.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
    }
}

/// <summary>A variable as it is: one column where it is a number, the 0/1 columns of all categories but the reference where it is categorical.</summary>
public sealed class VariableTerm(string variable) : Term
{
    /// <summary>Name of the variable.</summary>
    public string Variable { get; } = variable;

    /// <inheritdoc/>
    public override string Text => Quote(Variable);

    /// <inheritdoc/>
    public override IReadOnlyList<string> Variables => [Variable];
}

/// <summary>A whole power (2 to 20) of a numeric variable, formed in double-double from the decimals as written.</summary>
public sealed class PowerTerm(string variable, int degree) : Term
{
    /// <summary>Name of the variable.</summary>
    public string Variable { get; } = variable;

    /// <summary>The exponent, 2 or more.</summary>
    public int Degree { get; } = degree is >= 2 and <= 20
        ? degree
        : throw new ArgumentOutOfRangeException(nameof(degree), degree, "A power has a whole exponent from 2 to 20.");

    /// <inheritdoc/>
    public override string Text => $"{Quote(Variable)}^{Degree}";

    /// <inheritdoc/>
    public override IReadOnlyList<string> Variables => [Variable];
}
