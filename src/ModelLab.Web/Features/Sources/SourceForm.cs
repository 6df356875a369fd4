using ModelLab.Intake.Csv;
using ModelLab.Projects;
using ModelLab.Projects.Sources;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Sources;

/// <summary>The parts of an upload as the API describes them.</summary>
/// <param name="File">The data file.</param>
/// <param name="IdentifiersChecked"><c>true</c> once somebody has made sure that columns that seem to identify people may be kept.</param>
/// <param name="PreviousDatasetId">The dataset that the file corrects.</param>
/// <param name="Reason">Why it corrects it.</param>
/// <param name="Delimiter">The character between cells; found from the text by default.</param>
/// <param name="DecimalMark">The decimal mark; found from the text by default.</param>
/// <param name="Encoding"><c>utf-8</c> or <c>windows-1252</c>; found from the bytes by default.</param>
public sealed record UploadForm(
    IFormFile File, string? IdentifiersChecked, string? PreviousDatasetId, string? Reason, string? Delimiter, string? DecimalMark, string? Encoding);

/// <summary>Reads the fields of an upload, which may come before the file or behind it.</summary>
public sealed class SourceForm(UploadReader upload)
{
    private const string FilePart = "file";

    private static readonly string[] Known = ["identifiersChecked", "previousDatasetId", "reason", "delimiter", "decimalMark", "encoding"];

    private readonly Dictionary<string, string> fields = new(StringComparer.Ordinal);

    /// <summary>Reads the fields before the file.</summary>
    /// <exception cref="RefusedException">There is no file, or a field that is not known.</exception>
    public async Task<UploadPart> ReadToFileAsync(CancellationToken cancellation)
    {
        while (await upload.NextAsync(cancellation) is { } part)
        {
            if (part.Name == FilePart)
            {
                return part;
            }

            await TakeAsync(part, cancellation);
        }

        throw RefusedException.Invalid("There is no file: send it as the part 'file' of multipart/form-data. Nothing was stored.", FilePart);
    }

    /// <summary>Reads the fields behind the file.</summary>
    /// <exception cref="RefusedException">A second file, or a field that is not known.</exception>
    public async Task ReadRestAsync(CancellationToken cancellation)
    {
        while (await upload.NextAsync(cancellation) is { } part)
        {
            await TakeAsync(part, cancellation);
        }
    }

    /// <summary>What the fields read so far say.</summary>
    /// <exception cref="RefusedException">A field holds what it cannot hold.</exception>
    public SourceRequest ToRequest(string? fileName) => new(
        fileName,
        new CsvOptions(Character("delimiter", CsvTable.Delimiters), Character("decimalMark", CsvTable.DecimalMarks), Field("encoding")),
        Field("identifiersChecked") switch
        {
            null or "false" => false,
            "true" => true,
            var other => throw RefusedException.Invalid($"identifiersChecked is true or false, not '{other}'. Nothing was stored.", "identifiersChecked"),
        },
        Field("previousDatasetId"),
        Field("reason"));

    private async Task TakeAsync(UploadPart part, CancellationToken cancellation)
    {
        if (part.Name == FilePart)
        {
            throw RefusedException.Invalid("There is more than one file. Send one at a time. Nothing was stored.", FilePart);
        }

        if (!Known.Contains(part.Name, StringComparer.Ordinal))
        {
            throw RefusedException.Invalid($"The field '{part.Name}' is not known. Known beside file are: {string.Join(", ", Known)}. Nothing was stored.", part.Name);
        }

        if (!fields.TryAdd(part.Name, await part.ReadTextAsync(cancellation)))
        {
            throw RefusedException.Invalid($"The field '{part.Name}' stands twice. Nothing was stored.", part.Name);
        }
    }

    private string? Field(string name) => fields.GetValueOrDefault(name) is { Length: > 0 } text ? text : null;

    private char? Character(string name, IReadOnlyList<char> offered) => Field(name) switch
    {
        null => null,
        "\\t" or "tab" when offered.Contains('\t') => '\t',
        [var one] when offered.Contains(one) => one,
        var other => throw RefusedException.Invalid(
            $"{name} cannot be '{other}'; it is one of {string.Join(' ', offered.Select(c => c == '\t' ? "tab" : c.ToString()))}. Nothing was stored.", name),
    };
}
