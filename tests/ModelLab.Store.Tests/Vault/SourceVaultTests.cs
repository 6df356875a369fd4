using System.Security.Cryptography;
using ModelLab.Ledger;
using ModelLab.Projects;
using ModelLab.Store.Tests.Setting;
using ModelLab.Store.Vault;

namespace ModelLab.Store.Tests.Vault;

public sealed class SourceVaultTests
{
    private const int Chunk = 1 << 20;

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(Chunk - 1)]
    [InlineData(Chunk)]
    [InlineData(Chunk + 1)]
    [InlineData((5 * Chunk) + 1)]
    public async Task What_goes_in_comes_out_with_its_hash(int length)
    {
        await using var store = await TestStore.StartAsync();
        var content = Content(length);
        var stored = await store.Vault.StoreAsync("p", "s", new MemoryStream(content), TestStore.Cancellation);

        Assert.Equal(length, stored.Bytes);
        Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(content)), stored.Sha256.ToString());
        Assert.Equal(content, await ReadAsync(store, "s"));
        Assert.Equal((long)Math.Max(1, (length + Chunk - 1) / Chunk), store.Value("SELECT count(*) FROM source_chunks"));
    }

    // FIPS 180-4, the example for SHA-256 of "abc" (NIST, Cryptographic Standards and Guidelines, example values); from memory.
    [Fact]
    public async Task The_hash_is_the_published_one_of_the_bytes_as_received()
    {
        await using var store = await TestStore.StartAsync();
        var stored = await store.Vault.StoreAsync("p", "s", new MemoryStream("abc"u8.ToArray()), TestStore.Cancellation);
        Assert.Equal("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad", stored.Sha256.ToString());
    }

    [Fact]
    public async Task Reading_in_small_pieces_and_without_waiting_gives_the_same()
    {
        await using var store = await TestStore.StartAsync();
        var content = Content(Chunk + 700);
        await store.Vault.StoreAsync("p", "s", new MemoryStream(content), TestStore.Cancellation);
        using var stream = store.Vault.Open("p", "s");
        var read = new List<byte>();
        var piece = new byte[9973];
        for (int length; (length = stream.Read(piece, 0, piece.Length)) > 0;)
        {
            read.AddRange(piece.AsSpan(0, length));
        }

        Assert.Equal(content, read);
        Assert.Equal(0, stream.Read(piece, 0, piece.Length));
    }

    [Fact]
    public async Task Neither_content_nor_key_stands_in_any_file()
    {
        await using var store = await TestStore.StartAsync();
        var marked = "the-haul-of-the-third-of-march"u8.ToArray();
        await store.Vault.StoreAsync("p", "s", new MemoryStream([.. marked, .. Content(5000), .. marked]), TestStore.Cancellation);
        foreach (var file in Directory.EnumerateFiles(store.Folder, "*", SearchOption.AllDirectories).Where(f => !f.EndsWith(".lock", StringComparison.Ordinal)))
        {
            await using var stream = new FileStream(file, FileMode.Open, FileAccess.Read, FileShare.ReadWrite);
            using var memory = new MemoryStream();
            await stream.CopyToAsync(memory, TestStore.Cancellation);
            Assert.Equal(-1, memory.ToArray().AsSpan().IndexOf(marked));
        }
    }

    [Fact]
    public async Task A_changed_byte_of_any_chunk_is_found()
    {
        await using var store = await TestStore.StartAsync();
        await store.Vault.StoreAsync("p", "s", new MemoryStream(Content((2 * Chunk) + 10)), TestStore.Cancellation);
        for (var chunk = 0; chunk < 3; chunk++)
        {
            var before = (byte[])store.Value($"SELECT ciphertext FROM source_chunks WHERE chunk = {chunk}")!;
            foreach (var place in (int[])[0, before.Length / 2, before.Length - 1])
            {
                var changed = before.ToArray();
                changed[place] ^= 1;
                Put(store, chunk, changed);
                await DamagedAsync(store, $"Chunk {chunk} of source s is not what was stored.");
            }

            Put(store, chunk, before);
        }

        Assert.Equal((2 * Chunk) + 10, (await ReadAsync(store, "s")).Length);
    }

    [Fact]
    public async Task Swapped_chunks_are_found()
    {
        await using var store = await TestStore.StartAsync();
        await store.Vault.StoreAsync("p", "s", new MemoryStream(Content(3 * Chunk)), TestStore.Cancellation);
        store.SqlWithoutTriggers("UPDATE source_chunks SET chunk = 10 WHERE chunk = 0; UPDATE source_chunks SET chunk = 0 WHERE chunk = 1; UPDATE source_chunks SET chunk = 1 WHERE chunk = 10");
        await DamagedAsync(store, "Chunk 0 of source s is not what was stored.");
    }

    [Fact]
    public async Task A_chunk_of_another_source_is_found()
    {
        await using var store = await TestStore.StartAsync();
        await store.Vault.StoreAsync("p", "s", new MemoryStream(Content(100)), TestStore.Cancellation);
        await store.Vault.StoreAsync("p", "t", new MemoryStream(Content(100)), TestStore.Cancellation);
        store.SqlWithoutTriggers("UPDATE source_chunks SET ciphertext = (SELECT ciphertext FROM source_chunks WHERE source_id = 't') WHERE source_id = 's'");
        await DamagedAsync(store, "Chunk 0 of source s is not what was stored.");
    }

    [Fact]
    public async Task A_cut_tail_is_found_with_and_without_the_count_lowered()
    {
        await using var store = await TestStore.StartAsync();
        await store.Vault.StoreAsync("p", "s", new MemoryStream(Content(3 * Chunk)), TestStore.Cancellation);
        store.SqlWithoutTriggers("DELETE FROM source_chunks WHERE chunk = 2");
        await DamagedAsync(store, "Chunk 2 of source s is missing.");
        store.SqlWithoutTriggers($"UPDATE sources SET chunks = 2, bytes = {2 * Chunk}");
        await DamagedAsync(store, "Chunk 1 of source s is not what was stored.");
    }

    [Fact]
    public async Task An_unknown_source_is_not_found_and_one_without_its_key_is_withdrawn()
    {
        await using var store = await TestStore.StartAsync();
        Assert.Equal(RefusalKind.NotFound, Assert.Throws<RefusedException>(() => store.Vault.Open("p", "s")).Kind);

        await store.FillAsync();
        store.Keys.Destroy(SmallProject.Id, SmallProject.SourceId);
        Assert.Equal(RefusalKind.Withdrawn, Assert.Throws<RefusedException>(() => store.Vault.Open(SmallProject.Id, SmallProject.SourceId)).Kind);
        var part = await Assert.ThrowsAsync<RefusedException>(() => store.Vault.UnsealAsync(SmallProject.Id, 4, TestStore.Cancellation));
        Assert.Equal(RefusalKind.Withdrawn, part.Kind);
        var content = await Assert.ThrowsAsync<RefusedException>(
            () => store.Vault.ReadContentAsync(SmallProject.Id, Sha256Hash.Of([1, 0, 0, 0, 2, 0, 0, 0]), TestStore.Cancellation));
        Assert.Equal(RefusalKind.Withdrawn, content.Kind);
        var commit = await Assert.ThrowsAsync<RefusedException>(() => store.CommitAsync(SmallProject.Read("d2")));
        Assert.Equal(RefusalKind.Withdrawn, commit.Kind);
    }

    [Fact]
    public async Task An_upload_that_breaks_off_leaves_nothing()
    {
        await using var store = await TestStore.StartAsync();
        await Assert.ThrowsAsync<EndOfStreamException>(() => store.Vault.StoreAsync("p", "s", new BreakingStream(6 * Chunk), TestStore.Cancellation));
        Assert.Equal(0L, store.Value("SELECT (SELECT count(*) FROM sources) + (SELECT count(*) FROM source_chunks)"));
        Assert.Empty(store.Keys.All());
        Assert.Equal(5, (await store.Vault.StoreAsync("p", "s", new MemoryStream(Content(5)), TestStore.Cancellation)).Bytes);
    }

    [Fact]
    public async Task An_id_is_used_once()
    {
        await using var store = await TestStore.StartAsync();
        await store.Vault.StoreAsync("p", "s", new MemoryStream(Content(5)), TestStore.Cancellation);
        var refusal = await Assert.ThrowsAsync<RefusedException>(() => store.Vault.StoreAsync("p", "s", new MemoryStream(Content(6)), TestStore.Cancellation));
        Assert.Equal(RefusalKind.Conflict, refusal.Kind);
        Assert.Equal(5, (await ReadAsync(store, "s")).Length);
    }

    [Fact]
    public async Task A_discarded_source_is_gone_and_an_adopted_one_stays()
    {
        await using var store = await TestStore.StartAsync();
        await store.Vault.StoreAsync("p", "s", new MemoryStream(Content(5)), TestStore.Cancellation);
        await store.Vault.DiscardAsync("p", "s", TestStore.Cancellation);
        Assert.Throws<RefusedException>(() => store.Vault.Open("p", "s"));
        Assert.Empty(store.Keys.All());

        await store.FillAsync();
        await Assert.ThrowsAsync<RefusedException>(() => store.Vault.DiscardAsync(SmallProject.Id, SmallProject.SourceId, TestStore.Cancellation));
        using var stream = store.Vault.Open(SmallProject.Id, SmallProject.SourceId);
        using var memory = new MemoryStream();
        await stream.CopyToAsync(memory, TestStore.Cancellation);
        Assert.Equal(SmallProject.Table, memory.ToArray());
    }

    internal static byte[] Content(int length)
    {
        // Half of it text that packs well, half noise that does not.
        var content = new byte[length];
        new Random(length).NextBytes(content);
        for (var i = 0; i < length / 2; i++)
        {
            content[i] = (byte)('0' + (i % 10));
        }

        return content;
    }

    private static async Task<byte[]> ReadAsync(TestStore store, string sourceId)
    {
        await using var stream = store.Vault.Open("p", sourceId);
        using var memory = new MemoryStream();
        await stream.CopyToAsync(memory, TestStore.Cancellation);
        return memory.ToArray();
    }

    private static async Task DamagedAsync(TestStore store, string message) =>
        Assert.Equal(message, (await Assert.ThrowsAsync<VaultDamagedException>(() => ReadAsync(store, "s"))).Message);

    private static void Put(TestStore store, int chunk, byte[] ciphertext) =>
        store.SqlWithoutTriggers($"UPDATE source_chunks SET ciphertext = X'{Convert.ToHexString(ciphertext)}' WHERE chunk = {chunk}");

    private sealed class BreakingStream(int length) : MemoryStream(new byte[length])
    {
        public override ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellationToken = default) =>
            Position == Length ? throw new EndOfStreamException("The connection was lost.") : base.ReadAsync(buffer, cancellationToken);
    }
}
