using ModelLab.Store.Sqlite;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Upkeep;

public sealed class BackupTests
{
    [Fact]
    public async Task A_backup_made_under_writing_load_holds_every_entry_acknowledged_before_it()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        using var stop = new CancellationTokenSource();
        var acknowledged = 0L;
        var writing = Task.Run(
            async () =>
            {
                for (var i = 0; !stop.IsCancellationRequested; i++)
                {
                    var batch = await store.CommitAsync(SmallProject.Comment($"w{i}", new string('w', 3000)));
                    Interlocked.Exchange(ref acknowledged, batch.Head.Count);
                }
            },
            TestStore.Cancellation);
        while (Interlocked.Read(ref acknowledged) < 15 && !writing.IsCompleted)
        {
            await Task.Yield();
        }

        using var folders = new Folders();
        var before = Interlocked.Read(ref acknowledged);
        var backup = store.Get<StoreBackup>().Run(folders.Data, folders.Keys);
        await stop.CancelAsync();
        await writing;

        await using var restored = TestStore.Unstarted(folders.Target);
        Assert.Equal(backup.BackupId, restored.Get<StoreRestore>().Run(folders.Data, folders.Keys).BackupId);
        await restored.StartAgainAsync();
        Assert.Empty((await restored.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Problems);
        Assert.InRange((await restored.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation)).Count, before, Interlocked.Read(ref acknowledged));
        Assert.Equal("catch.csv", (await restored.Vault.UnsealAsync(SmallProject.Id, 4, TestStore.Cancellation))!["fileName"]!.GetValue<string>());
        await restored.CommitAsync(SmallProject.Comment("after"));
    }

    [Fact]
    public async Task Data_and_keys_are_apart()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        using var folders = new Folders();
        store.Get<StoreBackup>().Run(folders.Data, folders.Keys);
        Assert.Equal(["modellab.db"], Names(folders.Data));
        Assert.Equal(["keys.db", "master.key", "receipt-signing.pem"], Names(folders.Keys));
    }

    [Fact]
    public async Task Halves_of_two_backups_are_refused_and_the_target_stays_empty()
    {
        await using var store = await TestStore.StartAsync();
        using var first = new Folders();
        using var second = new Folders();
        store.Get<StoreBackup>().Run(first.Data, first.Keys);
        store.Get<StoreBackup>().Run(second.Data, second.Keys);
        await using var target = TestStore.Unstarted(first.Target);
        var refusal = Assert.Throws<StoreUnusableException>(() => target.Get<StoreRestore>().Run(first.Data, second.Keys));
        Assert.StartsWith("Data and keys are not of the same backup.", refusal.Message, StringComparison.Ordinal);
        Assert.False(Directory.Exists(first.Target) && Directory.EnumerateFileSystemEntries(first.Target).Any());
    }

    [Fact]
    public async Task A_missing_half_and_a_folder_in_use_are_refused()
    {
        await using var store = await TestStore.StartAsync();
        using var folders = new Folders();
        store.Get<StoreBackup>().Run(folders.Data, folders.Keys);
        Assert.Contains("is not an empty folder", Assert.Throws<StoreUnusableException>(() => store.Get<StoreBackup>().Run(folders.Data, folders.Target)).Message, StringComparison.Ordinal);
        Assert.Contains("neither within the other", Assert.Throws<StoreUnusableException>(
            () => store.Get<StoreBackup>().Run(Path.Combine(folders.Target, "a"), Path.Combine(folders.Target, "a", "b"))).Message, StringComparison.Ordinal);
        Assert.Contains("is not an empty folder", Assert.Throws<StoreUnusableException>(() => store.Get<StoreRestore>().Run(folders.Data, folders.Keys)).Message, StringComparison.Ordinal);
        File.Delete(Path.Combine(folders.Keys, "master.key"));
        await using var target = TestStore.Unstarted(Path.Combine(folders.Target, "new"));
        Assert.Contains("is missing", Assert.Throws<StoreUnusableException>(() => target.Get<StoreRestore>().Run(folders.Data, folders.Keys)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_damaged_backup_is_refused()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        using var folders = new Folders();
        store.Get<StoreBackup>().Run(folders.Data, folders.Keys);
        var database = Path.Combine(folders.Data, "modellab.db");
        var bytes = await File.ReadAllBytesAsync(database, TestStore.Cancellation);
        bytes.AsSpan(4096, 4096).Fill(0xA5);
        await File.WriteAllBytesAsync(database, bytes, TestStore.Cancellation);
        await using var target = TestStore.Unstarted(folders.Target);
        Assert.Throws<StoreUnusableException>(() => target.Get<StoreRestore>().Run(folders.Data, folders.Keys));
        Assert.False(File.Exists(target.Paths.Database));
    }

    [Fact]
    public async Task What_was_withdrawn_after_the_backup_is_withdrawn_again()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        using var folders = new Folders();
        store.Get<StoreBackup>().Run(folders.Data, folders.Keys);
        store.Keys.Destroy(SmallProject.Id, SmallProject.SourceId);

        await using var restored = TestStore.Unstarted(folders.Target);
        Assert.Equal(1, restored.Get<StoreRestore>().Run(folders.Data, folders.Keys, store.Paths.KeysDatabase).WithdrawnAgain);
        await restored.StartAgainAsync();
        Assert.Null(restored.Keys.Find(SmallProject.Id, SmallProject.SourceId));
        var check = await restored.Get<StoreCheck>().RunAsync(TestStore.Cancellation);
        Assert.Empty(check.Problems);
        Assert.Equal((0, 1), (check.Sources, check.Withdrawn));
    }

    private static IEnumerable<string?> Names(string folder) => Directory.EnumerateFileSystemEntries(folder).Select(Path.GetFileName).Order(StringComparer.Ordinal);

    private sealed class Folders : IDisposable
    {
        private readonly string root = TestStore.NewFolder();

        public string Data => Path.Combine(root, "data");

        public string Keys => Path.Combine(root, "keys");

        public string Target => Path.Combine(root, "target");

        public void Dispose() => Directory.Delete(root, recursive: true);
    }
}
