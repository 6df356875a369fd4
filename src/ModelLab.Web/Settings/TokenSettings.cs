using System.ComponentModel.DataAnnotations;

namespace ModelLab.Web.Settings;

/// <summary>API tokens: <c>ModelLab:Tokens</c>.</summary>
public sealed class TokenSettings : ISettings
{
    /// <summary>How many days a token is good for when nothing is said.</summary>
    [Range(1, 366)]
    public int DefaultDays { get; set; } = 90;

    /// <summary>The most days that may be asked for.</summary>
    [Range(1, 366)]
    public int MaximumDays { get; set; } = 366;

    /// <inheritdoc/>
    public IEnumerable<SettingProblem> Check()
    {
        if (DefaultDays > MaximumDays)
        {
            yield return new SettingProblem(nameof(DefaultDays), $"is {DefaultDays}, more than MaximumDays ({MaximumDays}).");
        }
    }
}
