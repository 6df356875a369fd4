namespace ModelLab.Intake;

/// <summary>One thing wrong with a file, with its place.</summary>
/// <param name="Row">Row number (1 = first row below the header; 0 = the header), or null where the file as a whole is meant.</param>
/// <param name="Column">Name of the column, or its number as text, or null.</param>
/// <param name="Message">What is wrong and what to do.</param>
public sealed record IntakeProblem(long? Row, string? Column, string Message);

/// <summary>A file was refused; nothing of it is kept.</summary>
public sealed class IntakeRefusedException(string message, IReadOnlyList<IntakeProblem> problems) : Exception(message)
{
    /// <summary>The problems, in the order of the file, at most a hundred.</summary>
    public IReadOnlyList<IntakeProblem> Problems { get; } = problems;
}
