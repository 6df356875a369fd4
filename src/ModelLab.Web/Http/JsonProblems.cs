using System.Text.Json;
using System.Text.Json.Serialization.Metadata;
using System.Text.RegularExpressions;
using ModelLab.Projects;
using ModelLab.Projects.Entries;

namespace ModelLab.Web.Http;

/// <summary>Says in plain words what is wrong with a JSON body, where, and what to do. The reader's own words name types of the program, which mean nothing to the sender.</summary>
public static partial class JsonProblems
{
    /// <summary>Explains what the reader refused. The column of the answer is the JSON path, e.g. <c>$.terms[0].variable</c>.</summary>
    public static RefusalDetail Explain(JsonException exception)
    {
        var path = string.IsNullOrEmpty(exception.Path) ? "$" : exception.Path;
        return new RefusalDetail(null, path, Message(exception, path));
    }

    private static string Message(JsonException exception, string path)
    {
        var text = PlaceSuffix().Replace(exception.Message, string.Empty);
        if (Unmapped().Match(text) is { Success: true } unmapped)
        {
            return $"The member '{unmapped.Groups["name"].Value}' is not known here.{Known(unmapped.Groups["type"].Value)}";
        }

        if (Missing().Match(text) is { Success: true } missing)
        {
            return $"Missing in the body at {path}: {missing.Groups["names"].Value.TrimEnd('.')}.";
        }

        if (Twice().Match(text) is { Success: true } twice)
        {
            return $"The member '{twice.Groups["name"].Value}' stands twice in one object; send it once.";
        }

        if (Null().Match(text) is { Success: true } none)
        {
            return $"The member '{JsonNamingPolicy.CamelCase.ConvertName(none.Groups["name"].Value)}' may not be null.";
        }

        if (Unconverted().Match(text) is { Success: true } unconverted)
        {
            return $"The value at {path} does not fit: expected is {Expected(unconverted.Groups["type"].Value, path)}.";
        }

        var place = exception.LineNumber is { } line ? $" (line {line + 1}, byte {exception.BytePositionInLine + 1})" : string.Empty;
        return exception.InnerException is JsonException or null && IsSyntax(exception)
            ? $"The body is not JSON{place}: {text.TrimEnd()}"
            : $"{text.TrimEnd()}{(path == "$" ? string.Empty : $" It stands at {path}.")}";
    }

    /// <summary>The reader throws a private type for broken syntax, which the serializer wraps.</summary>
    private static bool IsSyntax(JsonException exception) =>
        exception.GetType() != typeof(JsonException) || (exception.InnerException is JsonException inner && inner.GetType() != typeof(JsonException));

    private static string Known(string typeName)
    {
        if (Find(typeName) is not { } type)
        {
            return string.Empty;
        }

        var info = ApiJson.Options.GetTypeInfo(type);
        return info.Kind == JsonTypeInfoKind.Object && info.Properties.Count > 0
            ? $" Known are: {string.Join(", ", info.Properties.Select(p => p.Name))}."
            : string.Empty;
    }

    /// <summary>What belongs at a place. The reader names the type of the value there, or only that of the object around it.</summary>
    private static string Expected(string typeName, string path)
    {
        if (typeName.StartsWith("System.Collections", StringComparison.Ordinal) || typeName.EndsWith("[]", StringComparison.Ordinal))
        {
            return "a list";
        }

        var type = Find(Nullable().Match(typeName) is { Success: true } nullable ? nullable.Groups["type"].Value : typeName);
        if (type is not null && LastName().Match(path) is { Success: true } last && ApiJson.Options.GetTypeInfo(type) is { Kind: JsonTypeInfoKind.Object } around)
        {
            type = around.Properties.FirstOrDefault(p => p.Name == last.Groups["name"].Value)?.PropertyType ?? type;
        }

        return type is null ? "an object" : Expected(System.Nullable.GetUnderlyingType(type) ?? type);
    }

    private static string Expected(Type type) => type switch
    {
        { IsEnum: true } => "one of " + string.Join(", ", Enum.GetNames(type).Select(JsonNamingPolicy.CamelCase.ConvertName)),
        _ when type == typeof(string) => "a text",
        _ when type == typeof(bool) => "true or false",
        _ when type == typeof(double) => "a number",
        _ when type == typeof(int) || type == typeof(long) => "a whole number",
        _ when typeof(System.Collections.IEnumerable).IsAssignableFrom(type) => "a list",
        _ => "an object",
    };

    private static Type? Find(string typeName) =>
        Type.GetType(typeName) ?? typeof(JsonProblems).Assembly.GetType(typeName) ?? typeof(ProjectJson).Assembly.GetType(typeName)
        ?? typeof(Statistics.Designs.Term).Assembly.GetType(typeName) ?? typeof(Intake.VariableKind).Assembly.GetType(typeName);

    [GeneratedRegex(@"\s*Path: \$.*$", RegexOptions.Singleline)]
    private static partial Regex PlaceSuffix();

    [GeneratedRegex(@"^The JSON property '(?<name>.*)' could not be mapped to any \.NET member contained in type '(?<type>.*)'")]
    private static partial Regex Unmapped();

    [GeneratedRegex(@"was missing required properties including: (?<names>.*)$")]
    private static partial Regex Missing();

    [GeneratedRegex(@"^Duplicate property '(?<name>.*)' encountered")]
    private static partial Regex Twice();

    [GeneratedRegex(@"^The (constructor parameter|property or field) '(?<name>.*)' on type '.*' doesn't allow (setting )?null values")]
    private static partial Regex Null();

    [GeneratedRegex(@"^The JSON value could not be converted to (?<type>.*)\.$")]
    private static partial Regex Unconverted();

    [GeneratedRegex(@"\.(?<name>\w+)$")]
    private static partial Regex LastName();

    [GeneratedRegex(@"^System\.Nullable`1\[(?<type>.*)\]$")]
    private static partial Regex Nullable();
}
