using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Ledger;
using ModelLab.Projects.Sources;

namespace ModelLab.Web.Features.Sources;

/// <summary>A file taken in.</summary>
/// <param name="Id">Id of the source.</param>
/// <param name="SourceId">The same.</param>
/// <param name="DatasetId">Id of the dataset read from it.</param>
/// <param name="Sha256">SHA-256 of the file as received.</param>
/// <param name="Bytes">Its size.</param>
/// <param name="Rows">Rows below the header.</param>
/// <param name="Dialect">How the file is written.</param>
/// <param name="PreviousDatasetId">The dataset that it corrects, or null.</param>
/// <param name="Variables">The columns with what was seen of them.</param>
public sealed record SourceAnswer(
    string Id, string SourceId, string DatasetId, Sha256Hash Sha256, long Bytes, long Rows, CsvDialect Dialect, string? PreviousDatasetId,
    IReadOnlyList<ReceivedVariable> Variables)
{
    /// <summary>The answer for a file taken in.</summary>
    public static SourceAnswer Of(ReceivedSource received)
    {
        var columns = received.Profile.Columns.ToDictionary(c => c.Name, StringComparer.Ordinal);
        return new SourceAnswer(
            received.Source.Id, received.Source.Id, received.Dataset.Id, received.Source.Sha256, received.Source.Bytes, received.Source.Rows,
            received.Source.Dialect, received.Dataset.PreviousDatasetId,
            [
                .. received.Variables.Select(v => new ReceivedVariable(
                    v.VariableId, v.Name, v.Kind, v.Confirmed, v.Unit, v.Numeric, v.Missing, v.MissingCodes, v.Distinct,
                    columns[v.Name].DistinctCapped, columns[v.Name].Minimum, columns[v.Name].Maximum, columns[v.Name].Values, columns[v.Name].Questions)),
            ]);
    }
}

/// <summary>A column as it was seen.</summary>
/// <param name="Id">Id of the variable.</param>
/// <param name="Name">Header text.</param>
/// <param name="Kind">Proposed kind; it holds until changed.</param>
/// <param name="Confirmed">Whether a person has confirmed the description.</param>
/// <param name="Unit">Unit, or null.</param>
/// <param name="Numeric">Whether every value that is not missing is a number.</param>
/// <param name="Missing">Cells that are missing.</param>
/// <param name="MissingCodes">Texts taken as missing besides the empty cell.</param>
/// <param name="Distinct">Distinct values.</param>
/// <param name="DistinctCapped">Whether counting them stopped.</param>
/// <param name="Minimum">Smallest number, or null.</param>
/// <param name="Maximum">Largest number, or null.</param>
/// <param name="Values">All values with counts where they are few.</param>
/// <param name="Questions">What a person should look at.</param>
public sealed record ReceivedVariable(
    string Id, string Name, VariableKind Kind, bool Confirmed, string? Unit, bool Numeric, long Missing, IReadOnlyList<string> MissingCodes,
    long Distinct, bool DistinctCapped, double? Minimum, double? Maximum, IReadOnlyList<ValueCount> Values, IReadOnlyList<IntakeQuestion> Questions);
