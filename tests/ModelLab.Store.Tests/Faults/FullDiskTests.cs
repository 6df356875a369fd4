using System.Data.Common;
using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore.Diagnostics;
using ModelLab.Store.Server;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Tests.Faults;

public sealed class FullDiskTests
{
    [Fact]
    public async Task A_full_disk_is_said_plainly_and_nothing_is_stored_by_half()
    {
        var disk = new SmallDisk();
        await using var store = await TestStore.StartAsync(disk);
        await store.FillAsync();
        disk.Pages = (long)store.Value("PRAGMA page_count")! + 40;

        var noise = new byte[3 << 20];
        new Random(3).NextBytes(noise);
        var upload = await Assert.ThrowsAsync<StorageFailedException>(() => store.Vault.StoreAsync("p2", "big", new MemoryStream(noise), TestStore.Cancellation));
        Assert.True(upload.Full);
        Assert.StartsWith("The disk that holds the data is full. Nothing of this change was stored", upload.Message, StringComparison.Ordinal);
        var commit = await Assert.ThrowsAsync<StorageFailedException>(() => store.CommitAsync(SmallProject.Comment("big", new string('b', 1 << 20))));
        Assert.True(commit.Full);

        Assert.Equal(10, (await store.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation)).Count);
        Assert.Equal(1L, store.Value("SELECT count(*) FROM sources"));
        Assert.Empty((await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Problems);

        // With room again the same acts succeed.
        disk.Pages = 1 << 30;
        Assert.Equal(11, (await store.CommitAsync(SmallProject.Comment("big", new string('b', 1 << 20)))).Head.Count);
        Assert.Equal(noise.Length, (await store.Vault.StoreAsync("p2", "big", new MemoryStream(noise), TestStore.Cancellation)).Bytes);
    }

    [Fact]
    public async Task A_token_reads_on_a_full_disk_too()
    {
        var disk = new RefusedUses();
        await using var store = await TestStore.StartAsync(disk);
        var person = (await store.Get<ServerRecords>().EnrolAsync(ServerRecords.CommandLineActor, "Ben", "ben@example.org", false, TestStore.Cancellation)).Person.Id;
        var tokens = store.Get<ApiTokens>();
        var issued = await tokens.IssueAsync(person, person, "nightly run", TokenScope.Read, TimeSpan.FromDays(1), TestStore.Cancellation);
        disk.Full = true;
        Assert.Equal(person, (await tokens.FindHolderAsync(issued.Secret, TestStore.Cancellation))?.Person.Id);
        Assert.Null(Assert.Single(await tokens.OfPersonAsync(person, TestStore.Cancellation)).LastUsedAt);
        disk.Full = false;
        Assert.NotNull(await tokens.FindHolderAsync(issued.Secret, TestStore.Cancellation));
        Assert.NotNull(Assert.Single(await tokens.OfPersonAsync(person, TestStore.Cancellation)).LastUsedAt);
    }

    /// <summary>Answers a change of the tokens as a full disk does.</summary>
    private sealed class RefusedUses : DbCommandInterceptor
    {
        public bool Full { get; set; }

        public override ValueTask<InterceptionResult<int>> NonQueryExecutingAsync(
            DbCommand command, CommandEventData eventData, InterceptionResult<int> result, CancellationToken cancellationToken = default) =>
            Full && command.CommandText.StartsWith("UPDATE \"api_tokens\"", StringComparison.Ordinal)
                ? throw new SqliteException("database or disk is full", 13)
                : ValueTask.FromResult(result);
    }

    /// <summary>Lets the database grow to a number of pages and then answers as a full disk does (SQLITE_FULL).</summary>
    private sealed class SmallDisk : DbConnectionInterceptor
    {
        public long Pages { get; set; } = 1 << 30;

        public override void ConnectionOpened(DbConnection connection, ConnectionEndEventData eventData) => Limit(connection);

        public override Task ConnectionOpenedAsync(DbConnection connection, ConnectionEndEventData eventData, CancellationToken cancellationToken = default)
        {
            Limit(connection);
            return Task.CompletedTask;
        }

        private void Limit(DbConnection connection)
        {
            using var command = connection.CreateCommand();
#pragma warning disable CA2100 // a number
            command.CommandText = $"PRAGMA max_page_count={Pages}";
#pragma warning restore CA2100
            command.ExecuteNonQuery();
        }
    }
}
