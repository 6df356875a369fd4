using System.Globalization;

namespace ModelLab.Store.Sqlite.Starting;

/// <summary>Keeps a second server from the same data folder. The system lets go of it when the process ends, however it ends.</summary>
internal sealed class ServerLock : IDisposable
{
    private readonly FileStream file;

    private ServerLock(FileStream file) => this.file = file;

    /// <exception cref="StoreUnusableException">Another server holds it.</exception>
    public static ServerLock Take(StorePaths paths)
    {
        try
        {
            var file = new FileStream(paths.LockFile, FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None);
            file.SetLength(0);
            file.Write(System.Text.Encoding.ASCII.GetBytes(Environment.ProcessId.ToString(CultureInfo.InvariantCulture) + "\n"));
            file.Flush();
            return new ServerLock(file);
        }
        catch (IOException e)
        {
            throw new StoreUnusableException(
                $"Another ModelLab server uses the data folder {paths.DataFolder}. Stop it, or give this one a data folder of its own (ModelLab:DataFolder).", e);
        }
    }

    public void Dispose() => file.Dispose();
}
