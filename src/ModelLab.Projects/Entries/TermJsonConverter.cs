using System.Text.Json;
using System.Text.Json.Serialization;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Entries;

/// <summary>Terms as JSON: <c>{"variable":"x"}</c>, <c>{"power":{"variable":"x","degree":2}}</c>.</summary>
public sealed class TermJsonConverter : JsonConverter<Term>
{
    /// <inheritdoc/>
    public override Term Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options)
    {
        using var document = JsonDocument.ParseValue(ref reader);
        return Read(document.RootElement);
    }

    /// <inheritdoc/>
    public override void Write(Utf8JsonWriter writer, Term value, JsonSerializerOptions options)
    {
        writer.WriteStartObject();
        switch (value)
        {
            case VariableTerm variable:
                writer.WriteString("variable", variable.Variable);
                break;
            case PowerTerm power:
                writer.WriteStartObject("power");
                writer.WriteString("variable", power.Variable);
                writer.WriteNumber("degree", power.Degree);
                writer.WriteEndObject();
                break;
            default:
                throw new JsonException($"A term of type {value.GetType().Name} has no JSON form.");
        }

        writer.WriteEndObject();
    }

    private static Term Read(JsonElement element)
    {
        if (element.ValueKind != JsonValueKind.Object || element.EnumerateObject().Count() != 1)
        {
            throw new JsonException("A term is an object with one member: {\"variable\":\"x\"} or {\"power\":{\"variable\":\"x\",\"degree\":2}}.");
        }

        var member = element.EnumerateObject().Single();
        switch (member.Name)
        {
            case "variable" when member.Value.ValueKind == JsonValueKind.String:
                return new VariableTerm(member.Value.GetString()!);
            case "power" when member.Value.ValueKind == JsonValueKind.Object
                && member.Value.EnumerateObject().Count() == 2
                && member.Value.TryGetProperty("variable", out var variable) && variable.ValueKind == JsonValueKind.String
                && member.Value.TryGetProperty("degree", out var degree) && degree.TryGetInt32(out var exponent) && exponent is >= 2 and <= 20:
                return new PowerTerm(variable.GetString()!, exponent);
            case "power":
                throw new JsonException("A power names a variable and a whole degree from 2 to 20: {\"power\":{\"variable\":\"x\",\"degree\":2}}.");
            default:
                throw new JsonException($"'{member.Name}' is no kind of term offered here; there are \"variable\" and \"power\".");
        }
    }
}
