using System.Diagnostics;
using System.Globalization;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Faults;

public sealed class KilledWriterTests
{
    private const int Rounds = 6;
    private const int MostAcknowledgements = 24;

    [Fact]
    public async Task No_acknowledged_entry_is_lost_and_none_is_half_there()
    {
        await using var store = TestStore.Unstarted(TestStore.NewFolder());
        var random = new Random(20260301);
        for (var round = 0; round < Rounds; round++)
        {
            // Killed right after some acknowledgement, when the next batch or upload is somewhere on its way.
            var acknowledged = await WriteAndKillAsync(store.Folder, 1 + random.Next(MostAcknowledgements));

            await using var after = TestStore.Unstarted(store.Folder, removes: false);
            await after.StartAgainAsync();
            var head = await after.Projects.HeadAsync(SmallProject.Id, TestStore.Cancellation);
            Assert.True(head.Count >= acknowledged, $"Round {round}: {acknowledged} entries were acknowledged, {head.Count} are there.");
            Assert.Equal(0, head.Count % WritingProcess.BatchLength);
            var check = await after.Get<StoreCheck>().RunAsync(TestStore.Cancellation);
            Assert.Empty(check.Problems);
            Assert.Equal(0L, after.Value("SELECT count(*) FROM sources WHERE adopted = 0 AND chunks = 0"));
        }
    }

    private static async Task<long> WriteAndKillAsync(string folder, int acknowledgements)
    {
        var program = Path.Combine(AppContext.BaseDirectory, "ModelLab.Store.Tests" + (OperatingSystem.IsWindows() ? ".exe" : string.Empty));
        using var process = Process.Start(new ProcessStartInfo(program, [WritingProcess.Argument, folder]) { RedirectStandardOutput = true })!;
        try
        {
            var last = 0L;
            for (var i = 0; i < acknowledgements; i++)
            {
                var line = await process.StandardOutput.ReadLineAsync(TestStore.Cancellation) ?? throw new InvalidOperationException("The writing process ended by itself.");
                last = long.Parse(line, CultureInfo.InvariantCulture);
            }

            process.Kill();
            await process.WaitForExitAsync(TestStore.Cancellation);

            // What it still said before it died was acknowledged as well.
            while (await process.StandardOutput.ReadLineAsync(TestStore.Cancellation) is { } line)
            {
                last = long.TryParse(line, CultureInfo.InvariantCulture, out var number) ? number : last;
            }

            return last;
        }
        finally
        {
            if (!process.HasExited)
            {
                process.Kill();
            }
        }
    }
}
