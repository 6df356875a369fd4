using System.ComponentModel.DataAnnotations;

namespace ModelLab.Web.Settings;

/// <summary>Uploads of data files: <c>ModelLab:Uploads</c>.</summary>
public sealed class UploadSettings : ISettings
{
    /// <summary>Largest file, in bytes. One gibibyte by default.</summary>
    [Range(1, 64L * 1024 * 1024 * 1024)]
    public long MaximumBytes { get; set; } = 1024L * 1024 * 1024;

    /// <inheritdoc/>
    public IEnumerable<SettingProblem> Check() => [];
}
