using ModelLab.Projects.Storage;
using ModelLab.Store.Sqlite.Starting;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Faults;

/// <summary>A process that writes batches of three entries, tells each acknowledged number, and waits to be killed.</summary>
internal static class WritingProcess
{
    public const string Argument = "write-until-killed";
    public const int BatchLength = 3;

    private const int MostBatches = 2000;

    public static async Task<int> RunAsync(string folder)
    {
        await using var store = TestStore.Unstarted(folder, removes: false);
        await store.Get<StoreStartup>().StartAsync(CancellationToken.None);
        var count = (await store.Projects.HeadAsync(SmallProject.Id, CancellationToken.None)).Count;
        for (var batch = 0; batch < MostBatches; batch++)
        {
            count = batch % 4 == 3 ? await WithSourceAsync(store, count) : await CommentsAsync(store, count);
            await Console.Out.WriteLineAsync(count.ToString(System.Globalization.CultureInfo.InvariantCulture));
            await Console.Out.FlushAsync();
        }

        return 0;
    }

    private static async Task<long> CommentsAsync(TestStore store, long count)
    {
        var first = count == 0 ? SmallProject.Opened() : SmallProject.Comment($"c{count}-0", new string('x', 4000));
        var batch = new EntryBatch(
            SmallProject.Id, [first, SmallProject.Comment($"c{count}-1", new string('y', 4000)), SmallProject.Comment($"c{count}-2")], _ => { });
        return (await store.Projects.CommitAsync(batch, CancellationToken.None)).Head.Count;
    }

    private static async Task<long> WithSourceAsync(TestStore store, long count)
    {
        var id = $"s{count}";
        var content = new byte[3_000_000];
        new Random(17).NextBytes(content);
        var source = await store.Vault.StoreAsync(SmallProject.Id, id, new MemoryStream(content), CancellationToken.None);
        var batch = new EntryBatch(
            SmallProject.Id, [SmallProject.Received(source, id), SmallProject.Read($"d{count}", id), SmallProject.Comment($"c{count}")], _ => { }, AdoptedSources: [id]);
        return (await store.Projects.CommitAsync(batch, CancellationToken.None)).Head.Count;
    }
}
