using ModelLab.Statistics.Designs;

namespace ModelLab.Intake.Csv.Reading;

/// <summary>Takes the cells of one column and makes the column.</summary>
internal abstract class ColumnBuilder(ColumnRequest request)
{
    /// <summary>What is asked for.</summary>
    protected ColumnRequest Request { get; } = request;

    /// <summary>Takes the next cell.</summary>
    /// <returns>What is wrong with it and what to do, or null.</returns>
    internal abstract string? Add(ReadOnlySpan<byte> cell);

    /// <summary>The column. To be called once.</summary>
    /// <exception cref="IntakeRefusedException">The reference category is none of the categories.</exception>
    internal abstract Column Build();
}
