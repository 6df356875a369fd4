using ModelLab.Store.Keys;

namespace ModelLab.Store.Sqlite.Upkeep;

/// <summary>Names within a backup, and rules for its folders.</summary>
internal static class BackupFolders
{
    public const string Database = "modellab.db";
    public const string KeysDatabase = "keys.db";
    public const string MasterKey = "master.key";
    public const string SigningKey = "receipt-signing.pem";

    /// <summary>An absolute path of a folder that exists and is empty.</summary>
    public static string Empty(string folder)
    {
        var full = Path.GetFullPath(folder);
        if (File.Exists(full) || (Directory.Exists(full) && Directory.EnumerateFileSystemEntries(full).Any()))
        {
            throw new StoreUnusableException($"{full} is not an empty folder. Nothing in it was changed; give another one.");
        }

        PrivateFiles.MakeFolder(full);
        return full;
    }

    /// <summary>Data and keys in one place would be no protection.</summary>
    public static void RefuseOneInTheOther(string data, string keys)
    {
        if (Within(data, keys) || Within(keys, data))
        {
            throw new StoreUnusableException("Data and keys are backed up into two folders, neither within the other, so that they can be kept apart.");
        }
    }

    /// <summary>A file of a backup.</summary>
    public static string Existing(string folder, string name)
    {
        var path = Path.Combine(Path.GetFullPath(folder), name);
        return File.Exists(path) ? path : throw new StoreUnusableException($"{path} is missing: this is not a whole backup.");
    }

    private static bool Within(string inner, string outer) =>
        (inner + Path.DirectorySeparatorChar).StartsWith(outer + Path.DirectorySeparatorChar, StringComparison.Ordinal);
}
