using System.Security.Cryptography;
using ModelLab.Store.Keys;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Keys;

public sealed class SourceKeyTests
{
    private static readonly byte[] Bytes = [.. Enumerable.Range(0, 32).Select(i => (byte)i)];

    [Fact]
    public void Ciphertext_opens_only_with_its_purpose_nonce_and_place()
    {
        var key = new SourceKey(Bytes);
        var nonce = SourceKey.NonceOf(7);
        var ciphertext = key.Encrypt(KeyPurpose.Chunks, nonce, "p|s|7|last", [1, 2, 3]);
        Assert.Equal([1, 2, 3], key.Decrypt(KeyPurpose.Chunks, nonce, "p|s|7|last", ciphertext));
        Assert.Throws<AuthenticationTagMismatchException>(() => key.Decrypt(KeyPurpose.SealedParts, nonce, "p|s|7|last", ciphertext));
        Assert.Throws<AuthenticationTagMismatchException>(() => key.Decrypt(KeyPurpose.Chunks, SourceKey.NonceOf(8), "p|s|7|last", ciphertext));
        Assert.Throws<AuthenticationTagMismatchException>(() => key.Decrypt(KeyPurpose.Chunks, nonce, "p|s|7|more", ciphertext));
        Assert.Throws<AuthenticationTagMismatchException>(() => key.Decrypt(KeyPurpose.Chunks, nonce, "p|s|7|last", ciphertext.AsSpan(0, 15)));
    }

    // HKDF as RFC 5869 writes it, from HMAC alone: extract with a salt of zeros, one block of expansion.
    [Fact]
    public void The_key_of_a_purpose_is_the_one_of_rfc_5869()
    {
        var extracted = HMACSHA256.HashData(new byte[32], Bytes);
        var derived = HMACSHA256.HashData(extracted, (byte[])[.. "modellab source chunks 1"u8, 1]);
        var ciphertext = new SourceKey(Bytes).Encrypt(KeyPurpose.Chunks, SourceKey.NonceOf(1), "place", [9]);
        var plain = new byte[1];
        using var cipher = new AesGcm(derived, 16);
        cipher.Decrypt([0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 1], ciphertext.AsSpan(0, 1), ciphertext.AsSpan(1), plain, "place"u8);
        Assert.Equal([9], plain);
    }

    [Fact]
    public async Task A_key_is_kept_wrapped_and_comes_back()
    {
        await using var store = await TestStore.StartAsync();
        var made = store.Keys.Create("p", "s");
        var ciphertext = made.Encrypt(KeyPurpose.Chunks, SourceKey.NonceOf(0), "place", [5]);
        await using var other = TestStore.Unstarted(store.Folder, removes: false);
        Assert.Equal([5], other.Keys.Find("p", "s")!.Decrypt(KeyPurpose.Chunks, SourceKey.NonceOf(0), "place", ciphertext));
        Assert.Null(other.Keys.Find("p", "t"));
        Assert.Throws<InvalidOperationException>(() => other.Keys.Create("p", "s"));
    }

    [Fact]
    public async Task A_destroyed_key_is_gone_from_the_file_and_is_not_made_again()
    {
        await using var store = await TestStore.StartAsync();
        store.Keys.Create("p", "s");
        var wrapped = Wrapped(store);
        Assert.NotEqual(-1, (await FileAsync(store)).AsSpan().IndexOf(wrapped));
        store.Keys.Destroy("p", "s");
        Assert.Equal(-1, (await FileAsync(store)).AsSpan().IndexOf(wrapped));
        Assert.Null(store.Keys.Find("p", "s"));
        Assert.NotNull(Assert.Single(store.Keys.All()).DestroyedAt);
        Assert.Throws<InvalidOperationException>(() => store.Keys.Create("p", "s"));
    }

    [Fact]
    public async Task A_key_moved_to_another_source_does_not_open()
    {
        await using var store = await TestStore.StartAsync();
        store.Keys.Create("p", "s");
        using (var connection = TestStore.Open(store.Paths.KeysDatabase))
        {
            TestStore.Execute(connection, "UPDATE source_keys SET source_id = 't'");
        }

        Assert.Throws<KeysUnusableException>(() => store.Keys.Find("p", "t"));
    }

    [Fact]
    public async Task The_signing_key_is_made_once_on_the_curve_p_256()
    {
        await using var store = await TestStore.StartAsync();
        using var first = store.Get<ReceiptSigningKey>().Open();
        using var second = store.Get<ReceiptSigningKey>().Open();
        Assert.Equal(first.ExportSubjectPublicKeyInfo(), second.ExportSubjectPublicKeyInfo());
        Assert.Equal("1.2.840.10045.3.1.7", first.ExportParameters(false).Curve.Oid.Value);
        await File.WriteAllTextAsync(store.Paths.ReceiptSigningKeyFile, "no key", TestStore.Cancellation);
        Assert.Throws<KeysUnusableException>(() => store.Get<ReceiptSigningKey>().Open());
    }

    private static byte[] Wrapped(TestStore store)
    {
        using var connection = TestStore.Open(store.Paths.KeysDatabase);
        using var command = connection.CreateCommand();
        command.CommandText = "SELECT wrapped FROM source_keys";
        return (byte[])command.ExecuteScalar()!;
    }

    private static async Task<byte[]> FileAsync(TestStore store)
    {
        await using var stream = new FileStream(store.Paths.KeysDatabase, FileMode.Open, FileAccess.Read, FileShare.ReadWrite);
        using var memory = new MemoryStream();
        await stream.CopyToAsync(memory, TestStore.Cancellation);
        return memory.ToArray();
    }
}
