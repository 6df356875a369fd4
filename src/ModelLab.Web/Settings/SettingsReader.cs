using System.ComponentModel.DataAnnotations;
using System.Globalization;
using System.Reflection;

namespace ModelLab.Web.Settings;

/// <summary>
/// Reads the classes of settings strictly: a name that no class knows, or a value that does not fit, is a problem with the full
/// name of the setting. The usual binder passes over unknown names, and a misspelt limit would go unnoticed.
/// </summary>
public sealed class SettingsReader(IConfiguration configuration)
{
    private readonly List<SettingProblem> problems = [];

    /// <summary>What was wrong so far.</summary>
    public IReadOnlyList<SettingProblem> Problems => problems;

    /// <summary>Reads one class from a section.</summary>
    /// <param name="path">Full name of the section.</param>
    /// <param name="areas">Sub-sections that other classes read.</param>
    public T Read<T>(string path, IReadOnlyCollection<string>? areas = null)
        where T : class, ISettings, new()
    {
        var settings = new T();
        var known = typeof(T).GetProperties().Where(p => p.CanWrite).ToDictionary(p => p.Name, StringComparer.OrdinalIgnoreCase);
        foreach (var child in configuration.GetSection(path).GetChildren())
        {
            if (known.TryGetValue(child.Key, out var property))
            {
                Set(settings, property, child, $"{path}:{property.Name}");
            }
            else if (areas is null || !areas.Contains(child.Key, StringComparer.OrdinalIgnoreCase))
            {
                var names = string.Join(", ", known.Keys.Concat(areas ?? []).Order(StringComparer.Ordinal));
                problems.Add(new SettingProblem($"{path}:{child.Key}", $"is not known. Known under {path} are: {names}."));
            }
        }

        problems.AddRange(settings.Check().Select(p => p with { Setting = $"{path}:{p.Setting}" }));
        return settings;
    }

    private void Set(object settings, PropertyInfo property, IConfigurationSection section, string name)
    {
        if (property.PropertyType == typeof(IReadOnlyList<string>))
        {
            property.SetValue(settings, List(section));
            return;
        }

        if (section.GetChildren().Any())
        {
            problems.Add(new SettingProblem(name, "takes one value, not a section."));
            return;
        }

        var value = Parse(property.PropertyType, section.Value ?? string.Empty);
        if (value is null)
        {
            problems.Add(new SettingProblem(name, $"is '{section.Value}', which is {Expected(property.PropertyType)}."));
        }
        else if (property.GetCustomAttribute<RangeAttribute>() is { } range && !Within(range, value))
        {
            problems.Add(new SettingProblem(name, string.Create(CultureInfo.InvariantCulture, $"is {value}; it may be from {range.Minimum} to {range.Maximum}.")));
        }
        else
        {
            property.SetValue(settings, value);
        }
    }

    /// <summary>A list is given as numbered values or as one text with commas, as an environment variable likes it.</summary>
    private static List<string> List(IConfigurationSection section) =>
    [
        .. section.GetChildren().Select(c => c.Value ?? string.Empty)
            .Concat((section.Value ?? string.Empty).Split(','))
            .Select(v => v.Trim())
            .Where(v => v.Length > 0),
    ];

    private static object? Parse(Type type, string text) => type switch
    {
        _ when type == typeof(string) => text,
        _ when type == typeof(int) => int.TryParse(text, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out var i) ? i : null,
        _ when type == typeof(long) => long.TryParse(text, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out var l) ? l : null,
        _ when type == typeof(bool) => bool.TryParse(text, out var b) ? b : null,
        _ => throw new InvalidOperationException($"A setting of type {type.Name} cannot be read."),
    };

    /// <summary>Compared as decimals: the attribute's own check overflows where a value is larger than the type of its bounds.</summary>
    private static bool Within(RangeAttribute range, object value)
    {
        var number = Convert.ToDecimal(value, CultureInfo.InvariantCulture);
        return number >= Convert.ToDecimal(range.Minimum, CultureInfo.InvariantCulture) && number <= Convert.ToDecimal(range.Maximum, CultureInfo.InvariantCulture);
    }

    private static string Expected(Type type) => type == typeof(bool) ? "neither true nor false" : "no whole number";
}
