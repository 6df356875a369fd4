using System.Globalization;

namespace ModelLab.Intake.Csv;

/// <summary>Gathers the problems of a file and refuses it with all of them, or as soon as there are enough.</summary>
internal sealed class ProblemList
{
    private readonly List<IntakeProblem> problems = [];

    /// <summary>Whether nothing was found.</summary>
    internal bool IsEmpty => problems.Count == 0;

    /// <summary>Adds a problem.</summary>
    /// <exception cref="IntakeRefusedException">There are now as many as are told at once.</exception>
    internal void Add(long? row, string? column, string message)
    {
        problems.Add(new IntakeProblem(row, column, message));
        if (problems.Count >= IntakeLimits.Problems)
        {
            ThrowIfAny();
        }
    }

    /// <summary>Adds a problem that ends the reading.</summary>
    internal IntakeRefusedException Refusal(long? row, string? column, string message)
    {
        problems.Add(new IntakeProblem(row, column, message));
        return new IntakeRefusedException(Summary(), problems);
    }

    /// <summary>Takes back what was said of a row whose true problem is another.</summary>
    internal void Forget(long row) => problems.RemoveAll(p => p.Row == row);

    /// <summary>Refuses the file where anything was found.</summary>
    /// <exception cref="IntakeRefusedException">There are problems.</exception>
    internal void ThrowIfAny()
    {
        if (problems.Count > 0)
        {
            throw new IntakeRefusedException(Summary(), problems);
        }
    }

    private string Summary()
    {
        var first = problems[0];
        var place = (first.Row, first.Column) switch
        {
            (null, null) => string.Empty,
            (null, { } column) => $"Column '{column}': ",
            (0, null) => "Header: ",
            (0, { } column) => $"Header, column '{column}': ",
            ({ } row, null) => string.Create(CultureInfo.InvariantCulture, $"Row {row}: "),
            ({ } row, { } column) => string.Create(CultureInfo.InvariantCulture, $"Row {row}, column '{column}': "),
        };
        return problems.Count switch
        {
            1 => place + first.Message,
            >= IntakeLimits.Problems => string.Create(CultureInfo.InvariantCulture, $"{place}{first.Message} (The first of {problems.Count} problems; there may be more.)"),
            _ => string.Create(CultureInfo.InvariantCulture, $"{place}{first.Message} (The first of {problems.Count} problems.)"),
        };
    }
}
