using ModelLab.Intake.Csv.Proposals;
using ModelLab.Intake.Text;

namespace ModelLab.Intake.Csv.Profiling;

/// <summary>Reads a whole file once and keeps tallies only.</summary>
internal static class TableProfiler
{
    private const int RowsBetweenCancellationChecks = 1024;

    /// <summary>The profile of a file.</summary>
    internal static TableProfile Run(Stream stream, CsvOptions options, CancellationToken cancellation)
    {
        using var text = new SourceText(stream, options.Encoding);
        var delimiter = options.Delimiter;
        if (delimiter is null)
        {
            var head = text.Peek(DelimiterDetection.LookAhead, out var complete);
            delimiter = DelimiterDetection.Find(head, complete);
        }

        using var records = RecordReader.Open(text, delimiter.Value);
        var cap = Math.Min(IntakeLimits.DistinctPerColumn, IntakeLimits.DistinctInTable / records.Names.Count);
        var columns = records.Names.Select(name => new ColumnTally(name, cap)).ToArray();
        while (records.Read())
        {
            if (records.Row % RowsBetweenCancellationChecks == 0)
            {
                cancellation.ThrowIfCancellationRequested();
            }

            AddRow(records, columns);
        }

        return Conclude(text, delimiter.Value, options.DecimalMark, records.Row, columns);
    }

    private static void AddRow(RecordReader records, ColumnTally[] columns)
    {
        for (var i = 0; i < columns.Length; i++)
        {
            var cell = records[i];
            if (cell.Length > IntakeLimits.CellBytes)
            {
                records.Problems.Add(records.Row, columns[i].Name, CellTooLong.Message(cell.Length));
                continue;
            }

            columns[i].Add(cell, records.Row);
        }
    }

    private static TableProfile Conclude(SourceText text, char delimiter, char? givenMark, long rows, ColumnTally[] columns)
    {
        var mark = DecimalMarkDecision.Decide(columns, givenMark, delimiter);
        var problems = new ProblemList();
        foreach (var column in columns)
        {
            DecimalMarkDecision.Check(column, mark, problems);
        }

        problems.ThrowIfAny();
        var dialect = new CsvDialect(text.Encoding, text.ByteOrderMark, delimiter, mark);
        return new TableProfile(dialect, rows, [.. columns.Select(c => ColumnProposal.Of(c, dialect, givenMark is not null))]);
    }
}
