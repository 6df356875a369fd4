using System.ComponentModel.DataAnnotations;
using ModelLab.Store;

namespace ModelLab.Web.Settings;

/// <summary>Where the server keeps what it is given: the settings that stand directly under <c>ModelLab</c>.</summary>
public sealed class StorageSettings : ISettings
{
    /// <summary>
    /// Folder of the data. Empty: in the Development environment the folder <c>data</c> under the content root, elsewhere
    /// <c>ModelLab</c> in the account's folder for local application data. A relative path counts from the content root.
    /// </summary>
    public string DataFolder { get; set; } = string.Empty;

    /// <summary>Folder of the keys, so that they can lie, and be backed up, apart from the data. Empty: <c>keys</c> in the data folder.</summary>
    public string KeysFolder { get; set; } = string.Empty;

    /// <summary>File of the master key under which the keys of sources are wrapped. Empty: <c>master.key</c> in the folder of the keys.</summary>
    public string MasterKeyFile { get; set; } = string.Empty;

    /// <summary>After how many hours a source that no entry took up is swept.</summary>
    [Range(1, 24 * 30)]
    public int OrphanHours { get; set; } = 24;

    /// <summary>Largest body of any request except an upload, in bytes. The default takes a decision that names a million rows.</summary>
    [Range(16 * 1024, 64 * 1024 * 1024)]
    public long MaximumRequestBytes { get; set; } = 8 * 1024 * 1024;

    /// <inheritdoc/>
    public IEnumerable<SettingProblem> Check()
    {
        foreach (var (name, value) in new[] { (nameof(DataFolder), DataFolder), (nameof(KeysFolder), KeysFolder), (nameof(MasterKeyFile), MasterKeyFile) })
        {
            if (value.Contains('\0', StringComparison.Ordinal))
            {
                yield return new SettingProblem(name, "is no path.");
            }
        }
    }

    /// <summary>Fills in the defaults and makes all paths absolute.</summary>
    /// <exception cref="SettingsRefusedException">There is no place that could be taken by default.</exception>
    public void Settle(string contentRoot, bool development)
    {
        if (string.IsNullOrWhiteSpace(DataFolder))
        {
            var local = Environment.GetFolderPath(Environment.SpecialFolder.LocalApplicationData);
            if (!development && local.Length == 0)
            {
                throw new SettingsRefusedException([new SettingProblem("ModelLab:DataFolder", "has to be set: this account has no folder of its own for data.")]);
            }

            DataFolder = development ? "data" : Path.Combine(local, "ModelLab");
        }

        DataFolder = Path.GetFullPath(DataFolder, contentRoot);
        KeysFolder = string.IsNullOrWhiteSpace(KeysFolder) ? Path.Combine(DataFolder, "keys") : Path.GetFullPath(KeysFolder, contentRoot);
        MasterKeyFile = string.IsNullOrWhiteSpace(MasterKeyFile) ? Path.Combine(KeysFolder, "master.key") : Path.GetFullPath(MasterKeyFile, contentRoot);
    }

    /// <summary>The settings as the store takes them; call <see cref="Settle"/> first.</summary>
    public StoreSettings ToStore() => new() { DataFolder = DataFolder, KeysFolder = KeysFolder, MasterKeyFile = MasterKeyFile, OrphanHours = OrphanHours };
}
