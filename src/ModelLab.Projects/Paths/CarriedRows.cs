using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Paths;

/// <summary>A dataset with its dictionary and the source behind it.</summary>
public sealed record ReadTable(DataDictionary Dictionary, SourceView Source);

/// <summary>
/// Rows are left out by number. On a corrected file a number may name another row, which must not be left out in silence: rows that came or
/// went, or another identifier in a row that is left out, are refused.
/// </summary>
public sealed class CarriedRows(DatasetColumns columns)
{
    /// <summary>Checks the rows that a preparation names.</summary>
    /// <exception cref="RefusedException">A number does not name the same row in both files.</exception>
    public async Task RequireSameAsync(string projectId, PreparationView preparation, ReadTable before, ReadTable now, CancellationToken cancellation)
    {
        var rows = preparation.Steps.Where(s => s.Kind is StepKind.ExcludeRows or StepKind.RestoreRows).SelectMany(s => s.Rows!).Distinct().Order().ToList();
        if (rows.Count == 0)
        {
            return;
        }

        if (before.Source.Rows != now.Source.Rows)
        {
            throw RefusedException.Invalid(
                $"The path leaves out rows by their numbers, and the corrected file has {now.Source.Rows} rows where the earlier one had {before.Source.Rows}: a number may name another row now. "
                + "Start a new path on the corrected dataset and leave the rows out there.",
                "datasetId");
        }

        foreach (var variable in now.Dictionary.Variables.Where(v => v.Kind == VariableKind.Identifier))
        {
            var request = new ColumnRequest(variable.Name, false, variable.MissingCodes);
            var old = (CategoryColumn)(await columns.ReadAsync(projectId, before.Source, [request], cancellation))[0];
            var corrected = (CategoryColumn)(await columns.ReadAsync(projectId, now.Source, [request], cancellation))[0];
            var other = rows.Where(r => Text(old, r) != Text(corrected, r)).ToList();
            if (other.Count > 0)
            {
                throw new RefusedException(
                    RefusalKind.Invalid,
                    $"The path leaves out rows by their numbers, and {(other.Count == 1 ? $"row {other[0]} has" : $"rows {string.Join(", ", other.Take(20))} have")} another {variable.Name} in the corrected file than in the earlier one. "
                    + "Start a new path on the corrected dataset and leave the rows out there.",
                    [.. other.Take(100).Select(r => new RefusalDetail(r, variable.Name, $"Row {r} is another unit in the corrected file."))]);
            }
        }
    }

    private static string? Text(CategoryColumn column, long row) => column.Codes[(int)row - 1] is >= 0 and var code ? column.Categories[code] : null;
}
