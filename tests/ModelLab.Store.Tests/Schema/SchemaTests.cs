using Microsoft.EntityFrameworkCore;
using ModelLab.Store.Sqlite.Connections;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Schema;

public sealed class SchemaTests
{
    [Fact]
    public async Task Migrations_give_the_model_as_the_code_has_it()
    {
        await using var store = await TestStore.StartAsync();
        await using var context = SqliteContexts.Open(store.Paths.Database);
        Assert.False(context.Database.HasPendingModelChanges(), "Make a migration: dotnet ef migrations add <Name> in src/ModelLab.Store.Sqlite.");
    }

    [Fact]
    public async Task Nothing_is_removed_because_something_else_is()
    {
        await using var store = await TestStore.StartAsync();
        await using var context = SqliteContexts.Open(store.Paths.Database);
        var foreignKeys = context.Model.GetEntityTypes().SelectMany(e => e.GetForeignKeys()).ToList();
        Assert.True(foreignKeys.Count >= 7);
        Assert.All(foreignKeys, k => Assert.Equal(DeleteBehavior.Restrict, k.DeleteBehavior));
        Assert.Equal(0L, store.Value("SELECT count(*) FROM sqlite_master WHERE sql LIKE '%CASCADE%'"));
    }

    [Fact]
    public async Task Times_are_whole_microseconds_and_texts_compare_by_their_bytes()
    {
        await using var store = await TestStore.StartAsync();
        await store.FillAsync();
        Assert.Equal(new DateTimeOffset(2026, 3, 1, 9, 30, 0, TimeSpan.Zero).ToUnixTimeMilliseconds() * 1000, store.Value("SELECT received_at FROM sources"));
        Assert.Equal(0L, store.Value("SELECT count(*) FROM sqlite_master WHERE sql LIKE '%COLLATE%'"));
    }

    [Theory]
    [InlineData("journal_mode", "wal")]
    [InlineData("synchronous", "2")]
    [InlineData("foreign_keys", "1")]
    [InlineData("secure_delete", "1")]
    [InlineData("recursive_triggers", "1")]
    public async Task Connections_have_their_settings(string pragma, string expected)
    {
        await using var store = await TestStore.StartAsync();
        await using var context = SqliteContexts.Open(store.Paths.Database);
        await context.Database.OpenConnectionAsync(TestStore.Cancellation);
        await using var command = context.Database.GetDbConnection().CreateCommand();
#pragma warning disable CA2100 // written above
        command.CommandText = $"PRAGMA {pragma}";
#pragma warning restore CA2100
        Assert.Equal(expected, Convert.ToString(await command.ExecuteScalarAsync(TestStore.Cancellation), System.Globalization.CultureInfo.InvariantCulture));
    }
}
