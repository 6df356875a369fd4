using Microsoft.Data.Sqlite;
using Microsoft.Extensions.DependencyInjection;
using ModelLab.Store.Keys;
using ModelLab.Store.Sqlite;
using ModelLab.Store.Sqlite.Starting;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Starting;

public sealed class StoreStartupTests
{
    [Fact]
    public async Task A_first_start_makes_everything_and_a_second_one_changes_nothing()
    {
        var first = await TestStore.StartAsync();
        await first.FillAsync();
        var id = first.Value("SELECT value FROM store_facts WHERE name = 'store-id'");
        var head = await first.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation);
        var master = await File.ReadAllTextAsync(first.Paths.MasterKeyFile, TestStore.Cancellation);
        var signing = await File.ReadAllTextAsync(first.Paths.ReceiptSigningKeyFile, TestStore.Cancellation);

        await using var store = await first.ReopenAsync();
        await store.StartAgainAsync();
        Assert.Equal(id, store.Value("SELECT value FROM store_facts WHERE name = 'store-id'"));
        Assert.Equal(head, await store.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation));
        Assert.Equal(master, await File.ReadAllTextAsync(store.Paths.MasterKeyFile, TestStore.Cancellation));
        Assert.Equal(signing, await File.ReadAllTextAsync(store.Paths.ReceiptSigningKeyFile, TestStore.Cancellation));
        Assert.False(Directory.Exists(store.Paths.SnapshotFolder));
    }

    [Fact]
    public async Task Keys_may_lie_on_another_disk()
    {
        var root = TestStore.NewFolder();
        var settings = new StoreSettings
        {
            DataFolder = Path.Combine(root, "data"),
            KeysFolder = Path.Combine(root, "keys"),
            MasterKeyFile = Path.Combine(root, "master", "secret"),
        };
        await using (var services = new ServiceCollection().AddModelLabSqliteStore(settings).BuildServiceProvider())
        {
            await services.GetRequiredService<StoreStartup>().StartAsync(TestStore.Cancellation);
            services.GetRequiredService<ISourceKeys>().Create("p", "s");
            Assert.NotNull(services.GetRequiredService<ISourceKeys>().Find("p", "s"));
        }

        Assert.True(File.Exists(Path.Combine(root, "master", "secret")));
        Assert.True(File.Exists(Path.Combine(root, "keys", "keys.db")));
        Assert.False(Directory.Exists(Path.Combine(root, "data", "keys")));
        SqliteConnection.ClearAllPools();
        Directory.Delete(root, recursive: true);
    }

    [Fact]
    public async Task Folders_and_keys_are_for_the_servers_account_alone()
    {
        if (OperatingSystem.IsWindows())
        {
            Assert.Skip("File modes are Unix's.");
            return;
        }

        await using var store = TestStore.Unstarted(Path.Combine(TestStore.NewFolder(), "data"));
        await store.StartAgainAsync();
        const UnixFileMode others = UnixFileMode.GroupRead | UnixFileMode.GroupWrite | UnixFileMode.OtherRead | UnixFileMode.OtherWrite;
        foreach (var path in (string[])[store.Paths.MasterKeyFile, store.Paths.ReceiptSigningKeyFile, store.Paths.DataFolder, store.Paths.KeysFolder])
        {
            Assert.Equal(UnixFileMode.None, File.GetUnixFileMode(path) & others);
        }
    }

    [Fact]
    public async Task A_second_server_on_the_folder_is_refused_until_the_first_has_gone()
    {
        var first = await TestStore.StartAsync();
        await using var second = TestStore.Unstarted(first.Folder, removes: false);
        var refusal = await Assert.ThrowsAsync<StoreUnusableException>(second.StartAgainAsync);
        Assert.StartsWith($"Another ModelLab server uses the data folder {first.Folder}.", refusal.Message, StringComparison.Ordinal);

        // Verbs run beside it.
        Assert.True((await second.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Ok);
        await using var third = await first.ReopenAsync();
        await third.StartAgainAsync();
    }

    [Fact]
    public async Task A_database_of_a_newer_program_is_refused_as_it_is()
    {
        var first = await TestStore.StartAsync();
        first.Sql("INSERT INTO __EFMigrationsHistory VALUES ('99990101000000_Later', '99.0.0')");
        await using var store = await first.ReopenAsync();
        var refusal = await Assert.ThrowsAsync<StoreUnusableException>(store.StartAgainAsync);
        Assert.StartsWith("The database was written by a newer version of this program (it holds the change 99990101000000_Later).", refusal.Message, StringComparison.Ordinal);
        Assert.Throws<StoreUnusableException>(store.Get<StoreStartup>().OpenForVerb);
        Assert.Equal(1L, store.Value("SELECT count(*) FROM __EFMigrationsHistory WHERE MigrationId LIKE '9999%'"));
    }

    [Fact]
    public async Task A_lock_left_by_a_killed_migration_does_not_stop_the_start()
    {
        var first = await TestStore.StartAsync();
        await first.FillAsync();
        first.Sql("CREATE TABLE IF NOT EXISTS __EFMigrationsLock (Id INTEGER NOT NULL PRIMARY KEY, Timestamp TEXT NOT NULL); INSERT OR REPLACE INTO __EFMigrationsLock VALUES (1, '2026-03-01')");
        await using var store = await first.ReopenAsync();
        await store.StartAgainAsync();
        Assert.Equal(0L, store.Value("SELECT count(*) FROM __EFMigrationsLock"));
        Assert.True((await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Ok);
    }

    [Fact]
    public async Task A_migration_that_fails_leaves_the_state_before_it()
    {
        var first = await TestStore.StartAsync();
        await first.FillAsync();

        // Without its history all migrations seem still to come, and the first cannot make tables that exist.
        first.Sql("DELETE FROM __EFMigrationsHistory");
        await using var store = await first.ReopenAsync();
        var refusal = await Assert.ThrowsAsync<StoreUnusableException>(store.StartAgainAsync);
        Assert.StartsWith("The database could not be brought to the schema of this version", refusal.Message, StringComparison.Ordinal);
        Assert.Equal(10L, store.Value("SELECT count(*) FROM ledger_entries"));
        Assert.Equal(18L, store.Value("SELECT count(*) FROM sqlite_master WHERE type = 'trigger'"));
        Assert.False(File.Exists(Path.Combine(store.Folder, "migration-unfinished")));
        Assert.Single(Directory.GetFiles(store.Paths.SnapshotFolder));
    }

    [Fact]
    public async Task A_migration_killed_half_way_begins_again_from_the_copy()
    {
        var first = await TestStore.StartAsync();
        await first.FillAsync();
        var copy = Path.Combine(first.Folder, "copy.db");
        first.Sql($"VACUUM INTO '{copy}'");
        first.SqlWithoutTriggers("PRAGMA foreign_keys=OFF; DROP TABLE sealed_parts; ALTER TABLE source_chunks RENAME TO ef_temp_source_chunks; CREATE TABLE sealed_parts (ledger_id TEXT, entry_number INTEGER, source_id TEXT, nonce BLOB, ciphertext BLOB); CREATE TABLE source_chunks (project_id TEXT, source_id TEXT, chunk INTEGER, ciphertext BLOB)");
        await File.WriteAllTextAsync(Path.Combine(first.Folder, "migration-unfinished"), copy, TestStore.Cancellation);

        await using var store = await first.ReopenAsync();
        await store.StartAgainAsync();
        Assert.False(File.Exists(Path.Combine(store.Folder, "migration-unfinished")));
        Assert.Empty((await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Problems);
    }

    [Fact]
    public async Task A_first_start_killed_half_way_begins_again()
    {
        await using var store = TestStore.Unstarted(TestStore.NewFolder());
        store.Sql("CREATE TABLE accounts (half TEXT)");
        await File.WriteAllTextAsync(Path.Combine(store.Folder, "migration-unfinished"), "new", TestStore.Cancellation);
        await store.StartAgainAsync();
        await store.FillAsync();
        Assert.True((await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Ok);
    }

    [Fact]
    public async Task A_copy_that_is_gone_is_said_and_nothing_is_touched()
    {
        var first = await TestStore.StartAsync();
        await File.WriteAllTextAsync(Path.Combine(first.Folder, "migration-unfinished"), Path.Combine(first.Folder, "gone.db"), TestStore.Cancellation);
        await using var store = await first.ReopenAsync();
        Assert.Contains("gone.db, is gone", (await Assert.ThrowsAsync<StoreUnusableException>(store.StartAgainAsync)).Message, StringComparison.Ordinal);
        Assert.True(File.Exists(store.Paths.Database));
    }

    [Theory]
    [InlineData("This is no database, but a letter of some length that somebody put there.")]
    public async Task A_file_that_is_no_database_is_refused_as_it_is(string content)
    {
        await using var store = TestStore.Unstarted(TestStore.NewFolder());
        await File.WriteAllTextAsync(store.Paths.Database, content, TestStore.Cancellation);
        Assert.Contains("is damaged", (await Assert.ThrowsAsync<StoreUnusableException>(store.StartAgainAsync)).Message, StringComparison.Ordinal);
        Assert.Equal(content, await File.ReadAllTextAsync(store.Paths.Database, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_database_of_something_else_is_refused_as_it_is()
    {
        await using var store = TestStore.Unstarted(TestStore.NewFolder());
        store.Sql("CREATE TABLE recipes (name TEXT)");
        Assert.Contains("is not a database of this program", (await Assert.ThrowsAsync<StoreUnusableException>(store.StartAgainAsync)).Message, StringComparison.Ordinal);
        Assert.Equal(1L, store.Value("SELECT count(*) FROM sqlite_master"));
    }

    [Fact]
    public async Task A_missing_or_wrong_master_key_stops_the_start()
    {
        var first = await TestStore.StartAsync();
        var kept = await File.ReadAllTextAsync(first.Paths.MasterKeyFile, TestStore.Cancellation);
        File.Delete(first.Paths.MasterKeyFile);
        var store = await first.ReopenAsync();
        Assert.Contains("is missing", (await Assert.ThrowsAsync<KeysUnusableException>(store.StartAgainAsync)).Message, StringComparison.Ordinal);

        await File.WriteAllTextAsync(store.Paths.MasterKeyFile, new string('0', 64), TestStore.Cancellation);
        Assert.Contains("is not the one", (await Assert.ThrowsAsync<KeysUnusableException>(store.StartAgainAsync)).Message, StringComparison.Ordinal);
        await File.WriteAllTextAsync(store.Paths.MasterKeyFile, "key", TestStore.Cancellation);
        Assert.Contains("does not hold 64", (await Assert.ThrowsAsync<KeysUnusableException>(store.StartAgainAsync)).Message, StringComparison.Ordinal);

        await File.WriteAllTextAsync(store.Paths.MasterKeyFile, kept, TestStore.Cancellation);
        await using var good = await store.ReopenAsync();
        await good.StartAgainAsync();
    }

    [Theory]
    [InlineData("", 24, "ModelLab:DataFolder is empty")]
    [InlineData("data", 0, "ModelLab:OrphanHours must be a number above 0")]
    public void A_wrong_setting_is_named(string folder, double hours, string message) => Assert.StartsWith(
        message, Assert.Throws<StoreSettingsException>(() => new StoreSettings { DataFolder = folder, OrphanHours = hours }.Resolve()).Message, StringComparison.Ordinal);

    [Fact]
    public async Task Verbs_refuse_a_folder_without_a_database()
    {
        await using var store = TestStore.Unstarted(TestStore.NewFolder());
        var refusal = await Assert.ThrowsAsync<StoreUnusableException>(() => store.Get<StoreCheck>().RunAsync(TestStore.Cancellation));
        Assert.StartsWith("There is no database in", refusal.Message, StringComparison.Ordinal);
        Assert.False(File.Exists(store.Paths.Database));
    }
}
