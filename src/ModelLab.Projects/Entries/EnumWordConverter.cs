using System.Text.Json;
using System.Text.Json.Serialization;

namespace ModelLab.Projects.Entries;

/// <summary>
/// A value of an enum as its one camelCase word, and nothing else. The framework's own converter also reads other cases and lists
/// with commas, whose values it combines: "reviewer, analyst" would be an owner.
/// </summary>
public sealed class EnumWordConverter : JsonConverterFactory
{
    /// <inheritdoc/>
    public override bool CanConvert(Type typeToConvert) => typeToConvert.IsEnum;

    /// <inheritdoc/>
    public override JsonConverter CreateConverter(Type typeToConvert, JsonSerializerOptions options) =>
        (JsonConverter)Activator.CreateInstance(typeof(Words<>).MakeGenericType(typeToConvert))!;

    /// <summary>The words of an enum, in its order.</summary>
    public static IReadOnlyList<string> WordsOf(Type type) => [.. Enum.GetNames(type).Select(JsonNamingPolicy.CamelCase.ConvertName)];

    private sealed class Words<T> : JsonConverter<T>
        where T : struct, Enum
    {
        private readonly Dictionary<string, T> values = Enum.GetNames<T>().ToDictionary(JsonNamingPolicy.CamelCase.ConvertName, Enum.Parse<T>, StringComparer.Ordinal);
        private readonly Dictionary<T, string> words = Enum.GetValues<T>().Distinct().ToDictionary(v => v, v => JsonNamingPolicy.CamelCase.ConvertName(v.ToString()));

        public override T Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options) =>
            reader.TokenType == JsonTokenType.String && values.TryGetValue(reader.GetString()!, out var value) ? value : throw new JsonException();

        public override void Write(Utf8JsonWriter writer, T value, JsonSerializerOptions options) =>
            writer.WriteStringValue(words.TryGetValue(value, out var word) ? word : throw new JsonException($"{value} is no value of {typeof(T).Name}."));
    }
}
