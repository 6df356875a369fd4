using System.Text;
using ModelLab.Statistics.Designs;

namespace ModelLab.Intake.Csv.Reading;

/// <summary>Makes a column of categories, either of listed ones or of all texts met in ordinal order.</summary>
internal sealed class CategoryColumnBuilder : ColumnBuilder
{
    private readonly MissingCodes missing;
    private readonly ChunkedValues<int> codes = new();
    private readonly List<string> categories = [];
    private readonly Dictionary<string, int> indices = new(StringComparer.Ordinal);
    private readonly Dictionary<string, int>.AlternateLookup<ReadOnlySpan<char>> lookup;
    private char[] characters = new char[256];

    /// <summary>Begins a column.</summary>
    /// <exception cref="ArgumentException">A category is listed twice.</exception>
    internal CategoryColumnBuilder(ColumnRequest request)
        : base(request)
    {
        missing = new MissingCodes(request.MissingCodes);
        lookup = indices.GetAlternateLookup<ReadOnlySpan<char>>();
        foreach (var category in request.Categories ?? [])
        {
            if (!indices.TryAdd(category, categories.Count))
            {
                throw new ArgumentException($"A category of '{request.Name}' is listed twice.", nameof(request));
            }

            categories.Add(category);
        }
    }

    /// <inheritdoc/>
    internal override string? Add(ReadOnlySpan<byte> cell)
    {
        if (missing.Contains(cell))
        {
            codes.Add(-1);
            return null;
        }

        // as where the distinct values are listed: a text keeps the spaces around it, a number does not
        var trimmed = CellText.Trim(cell);
        cell = CellShape.OfTrimmed(trimmed).IsNumber ? trimmed : cell;

        if (cell.Length > IntakeLimits.CellBytes)
        {
            return CellTooLong.Message(cell.Length);
        }

        if (characters.Length < cell.Length)
        {
            characters = new char[cell.Length];
        }

        ReadOnlySpan<char> text = characters.AsSpan(0, Encoding.UTF8.GetChars(cell, characters));
        if (lookup.TryGetValue(text, out var code))
        {
            codes.Add(code);
            return null;
        }

        if (Request.Categories is not null)
        {
            return "The cell is none of the categories of this variable. Correct it in the file, add its text to the categories, or name it as a missing code.";
        }

        var category = text.ToString();
        indices.Add(category, categories.Count);
        codes.Add(categories.Count);
        categories.Add(category);
        return null;
    }

    /// <inheritdoc/>
    internal override Column Build()
    {
        var values = codes.ToArray();
        var ordered = categories.ToArray();
        if (Request.Categories is null)
        {
            Array.Sort(ordered, StringComparer.Ordinal);
            var places = new int[ordered.Length];
            for (var i = 0; i < ordered.Length; i++)
            {
                places[indices[ordered[i]]] = i;
            }

            for (var i = 0; i < values.Length; i++)
            {
                values[i] = values[i] < 0 ? -1 : places[values[i]];
            }
        }

        return new CategoryColumn(Request.Name, values, ordered, Reference(ordered));
    }

    private int Reference(string[] ordered)
    {
        if (Request.Reference is null)
        {
            return 0;
        }

        var reference = Array.IndexOf(ordered, Request.Reference);
        if (reference < 0)
        {
            var message = $"The reference category asked for is none of the {ordered.Length} categories of '{Request.Name}'. Choose one of them.";
            throw new IntakeRefusedException(message, [new IntakeProblem(null, Request.Name, message)]);
        }

        return reference;
    }
}
