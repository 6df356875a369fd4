namespace ModelLab.Store.Keys;

/// <summary>Files and folders that only the account of the server may read.</summary>
public static class PrivateFiles
{
    private const UnixFileMode OwnerFile = UnixFileMode.UserRead | UnixFileMode.UserWrite;
    private const UnixFileMode OwnerFolder = OwnerFile | UnixFileMode.UserExecute;

    /// <summary>Makes a folder, where there is none, that nobody else may look into.</summary>
    public static void MakeFolder(string folder)
    {
        if (OperatingSystem.IsWindows())
        {
            Directory.CreateDirectory(folder);
        }
        else
        {
            Directory.CreateDirectory(folder, OwnerFolder);
        }
    }

    /// <summary>Writes a new file (mode 0600) that is whole on the disk, or not there at all.</summary>
    /// <exception cref="IOException">There is such a file already, or it cannot be written.</exception>
    public static void WriteNew(string path, ReadOnlySpan<byte> content)
    {
        MakeFolder(Path.GetDirectoryName(path)!);
        var unfinished = path + ".new";
        File.Delete(unfinished);
        var options = new FileStreamOptions { Mode = FileMode.CreateNew, Access = FileAccess.Write, Share = FileShare.None };
        if (!OperatingSystem.IsWindows())
        {
            options.UnixCreateMode = OwnerFile;
        }

        using (var stream = new FileStream(unfinished, options))
        {
            stream.Write(content);
            stream.Flush(flushToDisk: true);
        }

        File.Move(unfinished, path, overwrite: false);
    }
}
