namespace ModelLab.Web.Settings;

/// <summary>A wrong setting.</summary>
/// <param name="Setting">Its full name, e.g. <c>ModelLab:Uploads:MaximumBytes</c>; from <see cref="ISettings.Check"/> the name of the property.</param>
/// <param name="Message">What is wrong, as the rest of a sentence that begins with the name.</param>
public sealed record SettingProblem(string Setting, string Message)
{
    /// <inheritdoc/>
    public override string ToString() => $"The setting {Setting} {Message}";
}

/// <summary>The settings of one area: a class with defaults, whose ranges stand as attributes on its properties.</summary>
public interface ISettings
{
    /// <summary>Checks what a range cannot say.</summary>
    IEnumerable<SettingProblem> Check();
}

/// <summary>The server does not start: settings are wrong. The message names each.</summary>
public sealed class SettingsRefusedException(IReadOnlyList<SettingProblem> problems)
    : Exception(string.Join(Environment.NewLine, problems))
{
    /// <summary>Every wrong setting.</summary>
    public IReadOnlyList<SettingProblem> Problems { get; } = problems;
}
