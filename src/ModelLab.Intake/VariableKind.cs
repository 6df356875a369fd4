namespace ModelLab.Intake;

/// <summary>The kind of a variable.</summary>
public enum VariableKind
{
    /// <summary>A measured number.</summary>
    Continuous,

    /// <summary>Two values.</summary>
    Binary,

    /// <summary>Unordered categories.</summary>
    Categorical,

    /// <summary>Ordered categories.</summary>
    Ordered,

    /// <summary>Names a unit; never enters a model.</summary>
    Identifier,

    /// <summary>A calendar date.</summary>
    Date,
}
