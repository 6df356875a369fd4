namespace ModelLab.Store;

/// <summary>Where the store keeps its files. Section <c>ModelLab</c> of the settings.</summary>
public sealed class StoreSettings
{
    /// <summary>Name of the settings' section.</summary>
    public const string Section = "ModelLab";

    /// <summary>Folder of the data; created where it does not exist.</summary>
    public string DataFolder { get; set; } = string.Empty;

    /// <summary>Folder of the keys; by default <c>keys</c> in the data folder. It is backed up apart from the data.</summary>
    public string? KeysFolder { get; set; }

    /// <summary>File of the master key under which source keys are wrapped; by default <c>master.key</c> in the folder of the keys.</summary>
    public string? MasterKeyFile { get; set; }

    /// <summary>After how many hours a source that no entry took up is swept.</summary>
    public double OrphanHours { get; set; } = 24;

    /// <summary>The settings with all paths absolute and defaults filled in.</summary>
    /// <exception cref="StoreSettingsException">A setting is missing or wrong; the message names it.</exception>
    public StorePaths Resolve()
    {
        var data = Absolute(DataFolder, "DataFolder");
        var keys = KeysFolder is null ? Path.Combine(data, "keys") : Absolute(KeysFolder, "KeysFolder");
        var master = MasterKeyFile is null ? Path.Combine(keys, "master.key") : Absolute(MasterKeyFile, "MasterKeyFile");
        if (!double.IsFinite(OrphanHours) || OrphanHours <= 0)
        {
            throw new StoreSettingsException($"{Section}:OrphanHours must be a number above 0; it is {OrphanHours}.");
        }

        return new StorePaths(data, keys, master);
    }

    private static string Absolute(string path, string setting)
    {
        if (string.IsNullOrWhiteSpace(path))
        {
            throw new StoreSettingsException($"{Section}:{setting} is empty: give the path of a folder that this program may write to.");
        }

        try
        {
            return Path.GetFullPath(path);
        }
        catch (ArgumentException e)
        {
            throw new StoreSettingsException($"{Section}:{setting} is no path: {e.Message}");
        }
    }
}

/// <summary>A setting of the store is missing or wrong.</summary>
public sealed class StoreSettingsException(string message) : Exception(message);

/// <summary>Where the store's files lie. All paths are absolute.</summary>
/// <param name="DataFolder">Folder of the data.</param>
/// <param name="KeysFolder">Folder of the keys.</param>
/// <param name="MasterKeyFile">The master key.</param>
public sealed record StorePaths(string DataFolder, string KeysFolder, string MasterKeyFile)
{
    /// <summary>The database: ledgers, read models, sources, accounts.</summary>
    public string Database => Path.Combine(DataFolder, "modellab.db");

    /// <summary>The database of wrapped source keys.</summary>
    public string KeysDatabase => Path.Combine(KeysFolder, "keys.db");

    /// <summary>The key that signs receipts.</summary>
    public string ReceiptSigningKeyFile => Path.Combine(KeysFolder, "receipt-signing.pem");

    /// <summary>Held open by a running server.</summary>
    public string LockFile => Path.Combine(DataFolder, "server.lock");

    /// <summary>Copies of the database made before a migration.</summary>
    public string SnapshotFolder => Path.Combine(DataFolder, "snapshots");
}
