namespace ModelLab.Statistics.Designs;

/// <summary>Why a model cannot be fitted.</summary>
public enum ModelRefusal
{
    /// <summary>A variable of the model is not in the table.</summary>
    UnknownVariable,

    /// <summary>The outcome is categorical.</summary>
    OutcomeNotNumeric,

    /// <summary>The outcome has one value in all rows.</summary>
    OutcomeConstant,

    /// <summary>A predictor has one value in the rows analysed.</summary>
    PredictorConstant,

    /// <summary>A power of a categorical variable was asked for.</summary>
    TermNotNumeric,

    /// <summary>A row given for analysis is missing in a variable of the model, or a value is infinite.</summary>
    ValueMissing,

    /// <summary>There are no more rows than columns, so that nothing is left to judge the fit by.</summary>
    TooFewRows,

    /// <summary>Columns are (nearly) combinations of others; <see cref="ModelRefusedException.Aliases"/> names them.</summary>
    RankDeficient,

    /// <summary>The outcome is also used in a term.</summary>
    OutcomeAmongTerms,

    /// <summary>The model has neither an intercept nor a term.</summary>
    NothingToFit,

    /// <summary>The values of a variable or power are so large or so small that squares leave the range of double.</summary>
    ValueOutOfRange,
}

/// <summary>One column that the columns before it already determine.</summary>
/// <param name="Column">Text of the column: its term, for a category <c>term [category]</c>.</param>
/// <param name="DeterminedBy">Texts of the columns that it is a combination of, the intercept as <c>intercept</c>.</param>
public sealed record Alias(string Column, IReadOnlyList<string> DeterminedBy);

/// <summary>A model was refused before anything was computed from it. The message says what is wrong and what to do.</summary>
public sealed class ModelRefusedException : Exception
{
    /// <summary>Refuses a model.</summary>
    public ModelRefusedException(ModelRefusal refusal, string message, IReadOnlyList<string>? variables = null, IReadOnlyList<Alias>? aliases = null)
        : base(message)
    {
        Refusal = refusal;
        Variables = variables ?? [];
        Aliases = aliases ?? [];
    }

    /// <summary>Why.</summary>
    public ModelRefusal Refusal { get; }

    /// <summary>The variables concerned.</summary>
    public IReadOnlyList<string> Variables { get; }

    /// <summary>The aliased columns, where the model is rank deficient.</summary>
    public IReadOnlyList<Alias> Aliases { get; }
}
