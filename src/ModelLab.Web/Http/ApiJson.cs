using System.Text.Json;
using System.Text.Json.Serialization;
using System.Text.Json.Serialization.Metadata;
using ModelLab.Projects.Entries;

namespace ModelLab.Web.Http;

/// <summary>JSON over HTTP: the project's rules, and strict reading.</summary>
public static class ApiJson
{
    /// <summary>Deepest nesting of a body: a term inside a list inside a request needs six.</summary>
    public const int MaximumDepth = 32;

    /// <summary>The options, for writing and reading outside the framework's own binding.</summary>
    public static JsonSerializerOptions Options { get; } = Make();

    /// <summary>
    /// Sets the options: nulls are written; members that are not known, members that stand twice, missing members and nulls where
    /// none may stand are refused, so that a misspelt word never passes for a default.
    /// </summary>
    public static void Apply(JsonSerializerOptions options)
    {
        ProjectJson.Apply(options, JsonIgnoreCondition.Never);
        options.Converters.Add(new FiniteNumberConverter());
        options.UnmappedMemberHandling = JsonUnmappedMemberHandling.Disallow;
        options.AllowDuplicateProperties = false;
        options.RespectNullableAnnotations = true;
        options.TypeInfoResolver = new DefaultJsonTypeInfoResolver { Modifiers = { RequireWhatMayNotBeNull, RefuseNullsInLists } };
        options.MaxDepth = MaximumDepth;
    }

    /// <summary>A constructor parameter that may not be null and has no default has to be there. One that may be null may also be missing.</summary>
    private static void RequireWhatMayNotBeNull(JsonTypeInfo type)
    {
        foreach (var property in type.Properties.Where(p => p.AssociatedParameter is { HasDefaultValue: false, IsNullable: false }))
        {
            property.IsRequired = true;
        }
    }

    /// <summary>No list of a request has places for nothing; the reader itself checks members alone.</summary>
    private static void RefuseNullsInLists(JsonTypeInfo type)
    {
        var lists = type.Properties
            .Where(p => p is { AssociatedParameter: not null, Get: not null } && IsListOfReferences(p.PropertyType))
            .ToList();
        if (type.Kind != JsonTypeInfoKind.Object || lists.Count == 0)
        {
            return;
        }

        type.OnDeserialized = value =>
        {
            foreach (var list in lists)
            {
                if (list.Get!(value) is IEnumerable<object?> elements && elements.Contains(null))
                {
                    throw new JsonException($"The list '{list.Name}' holds null; leave it out or put a value there.");
                }
            }
        };
    }

    private static bool IsListOfReferences(Type type) =>
        type.IsGenericType && type.GetGenericTypeDefinition() == typeof(IReadOnlyList<>) && !type.GetGenericArguments()[0].IsValueType;

    private static JsonSerializerOptions Make()
    {
        var options = new JsonSerializerOptions(JsonSerializerDefaults.Web);
        Apply(options);
        options.MakeReadOnly(populateMissingResolver: true);
        return options;
    }

    /// <summary>The reader takes 1e999 for infinity; here it is refused.</summary>
    private sealed class FiniteNumberConverter : JsonConverter<double>
    {
        public override double Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options)
        {
            if (reader.TokenType != JsonTokenType.Number)
            {
                throw new JsonException("A number is expected here.");
            }

            var value = reader.GetDouble();
            return double.IsFinite(value) ? value : throw new JsonException("The number is too large for a double.");
        }

        public override void Write(Utf8JsonWriter writer, double value, JsonSerializerOptions options)
        {
            if (double.IsFinite(value))
            {
                writer.WriteNumberValue(value);
            }
            else
            {
                // A value that does not exist is null over HTTP, never NaN.
                writer.WriteNullValue();
            }
        }
    }
}
