using System.Text.Json;
using System.Text.Json.Serialization;
using ModelLab.Ledger;

namespace ModelLab.Projects.Entries;

/// <summary>How the records of a project are written as JSON: in entries, in the read model and over HTTP.</summary>
public static class ProjectJson
{
    /// <summary>camelCase, enums as camelCase words, absent where null: for entries and documents.</summary>
    public static JsonSerializerOptions Options { get; } = Make(JsonIgnoreCondition.WhenWritingNull);

    /// <summary>The same with nulls written: for answers over HTTP, where a value that does not exist is null.</summary>
    public static JsonSerializerOptions HttpOptions { get; } = Make(JsonIgnoreCondition.Never);

    /// <summary>Adds the converters and rules to given options.</summary>
    public static void Apply(JsonSerializerOptions options, JsonIgnoreCondition nulls)
    {
        options.PropertyNamingPolicy = JsonNamingPolicy.CamelCase;
        options.PropertyNameCaseInsensitive = false;
        options.DefaultIgnoreCondition = nulls;
        options.NumberHandling = JsonNumberHandling.Strict;
        options.Encoder = System.Text.Encodings.Web.JavaScriptEncoder.UnsafeRelaxedJsonEscaping;
        options.Converters.Add(new EnumWordConverter());
        options.Converters.Add(new TermJsonConverter());
        options.Converters.Add(new Sha256HashJsonConverter());
    }

    private static JsonSerializerOptions Make(JsonIgnoreCondition nulls)
    {
        var options = new JsonSerializerOptions();
        Apply(options, nulls);
        options.MakeReadOnly(populateMissingResolver: true);
        return options;
    }

    private sealed class Sha256HashJsonConverter : JsonConverter<Sha256Hash>
    {
        public override Sha256Hash Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options)
        {
            try
            {
                return Sha256Hash.Parse(reader.GetString() ?? string.Empty);
            }
            catch (FormatException e)
            {
                throw new JsonException(e.Message, e);
            }
        }

        public override void Write(Utf8JsonWriter writer, Sha256Hash value, JsonSerializerOptions options) => writer.WriteStringValue(value.ToString());
    }
}
