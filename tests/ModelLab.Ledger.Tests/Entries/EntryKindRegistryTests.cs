using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Merkle;
using Xunit;

namespace ModelLab.Ledger.Tests.Entries;

public class EntryKindRegistryTests
{
    private static readonly string Folder = Path.Combine(AppContext.BaseDirectory, "Fixtures", "Kinds");

    private static readonly EntryKindRegistry Registry = new(
        EntryKindReader.For("sample-weighed", ReadWeighing, FromGrams, WithScale),
        EntryKindReader.For("sample-lost", body => body["sample"]!.GetValue<string>()));

    private static IReadOnlyList<string> Kinds => [.. Registry.Kinds.Select(k => k.ToString())];

    private sealed record Weighing(string Sample, double Milligrams, string Scale);

    [Fact]
    public void Old_versions_are_raised_step_by_step_to_the_newest_on_reading_only()
    {
        var first = Frozen("sample-weighed-1");
        Assert.Equal(new Weighing("A 7", 12_500, "unknown"), Registry.Read(first).Value);
        Assert.Equal("""{"grams":12.5,"sample":"A 7"}""", first.Body.ToJsonString());
        Assert.Equal(new Weighing("B 1", 3_400, "unknown"), Registry.Read(Frozen("sample-weighed-2")).Value);
        Assert.Equal(new Weighing("C", 1, "scale 2"), Registry.Read(Entry("sample-weighed/3", """{"mass":{"unit":"mg","value":1},"sample":"C","scale":"scale 2"}""")).Value);
    }

    [Theory]
    [InlineData("sample-found/1")]
    [InlineData("sample-weighed/4")]
    public void Kinds_and_versions_not_known_stay_readable_as_they_are(string kind)
    {
        var content = Registry.Read(Entry(kind, """{"sample":"A 7","more":[1]}"""));
        Assert.False(content.Known);
        Assert.Null(content.Value);
        Assert.Equal("A 7", content.Entry.Body["sample"]!.GetValue<string>());
        Assert.False(Registry.Knows(kind));
        Assert.True(Registry.Knows("sample-weighed/1"));
        Assert.False(Registry.Knows("no kind"));
    }

    [Fact]
    public void A_body_that_is_not_of_its_kind_is_named_with_its_entry() => Assert.StartsWith(
        "Entry 1 calls itself sample-weighed/1, but its body cannot be read as that.",
        Assert.Throws<FormatException>(() => Registry.Read(Entry("sample-weighed/1", """{"grams":"heavy","sample":"A"}"""))).Message,
        StringComparison.Ordinal);

    [Fact]
    public void All_kinds_in_all_versions_are_listed() => Assert.Equal(
        ["sample-lost/1", "sample-weighed/1", "sample-weighed/2", "sample-weighed/3"],
        Kinds);

    [Fact]
    public void Names_must_be_names_and_unique()
    {
        Assert.Throws<ArgumentException>(() => EntryKindReader.For("Sample", b => b));
        Assert.Throws<ArgumentException>(() => new EntryKindRegistry(EntryKindReader.For("a", b => b), EntryKindReader.For("a", b => b)));
    }

    /// <summary>Bytes and hashes were made by a script in another language (hashlib of Python 3) from the documented form.</summary>
    [Fact]
    public void Frozen_entries_are_read_and_hash_as_they_did()
    {
        Assert.Empty(FrozenEntries.Problems(Folder, Kinds, e => Assert.True(Registry.Read(e).Known)));
        var first = Frozen("sample-weighed-1");
        var second = Frozen("sample-weighed-2");
        Assert.Equal(first.Hash, second.Previous);
        Assert.Equal("1c9cacdf46cd3c7647f75eda199c2b6e5b6f49f63ff843d124b420fa46c35830", MerkleRoot.Of([first.Hash, second.Hash]).ToString());
        Assert.True(SealedCommitment.Matches(
            second.Sealed!, new SealedContent("s-1", [.. Enumerable.Range(0, 32).Select(i => (byte)i)], JsonNode.Parse("""{"row":[1,"x"]}""")!.AsObject())));
    }

    [Fact]
    public void The_check_of_frozen_entries_finds_what_is_missing_changed_or_unreadable()
    {
        using var folder = new TemporaryFolder();
        foreach (var file in Directory.GetFiles(Folder))
        {
            File.Copy(file, Path.Combine(folder.Path, Path.GetFileName(file)));
        }

        Assert.Empty(FrozenEntries.Problems(folder.Path, Kinds, _ => { }));
        Assert.Single(FrozenEntries.Problems(folder.Path, [.. Kinds, "sample-weighed/4"], _ => { }));
        Assert.Equal(4, FrozenEntries.Problems(folder.Path, Kinds, _ => throw new FormatException("unreadable")).Count);

        var first = Path.Combine(folder.Path, "sample-weighed-1.bin");
        var bytes = File.ReadAllText(first);
        File.WriteAllText(first, bytes.Replace("12.5", "12.6", StringComparison.Ordinal));
        Assert.Single(FrozenEntries.Problems(folder.Path, Kinds, _ => { }));
        File.WriteAllText(first, bytes.Replace("12.5", "12.50", StringComparison.Ordinal));
        Assert.Single(FrozenEntries.Problems(folder.Path, Kinds, _ => { }));
        File.Delete(first);
        Assert.Single(FrozenEntries.Problems(folder.Path, Kinds, _ => { }));
        File.WriteAllText(Path.Combine(folder.Path, "other-1.bin"), bytes);
        Assert.Equal(2, FrozenEntries.Problems(folder.Path, Kinds, _ => { }).Count);
    }

    private static Weighing ReadWeighing(JsonObject body) => new(
        body["sample"]!.GetValue<string>(), body["mass"]!["value"]!.GetValue<double>(), body["scale"]!.GetValue<string>());

    private static JsonObject FromGrams(JsonObject body)
    {
        body["mass"] = new JsonObject { ["unit"] = "mg", ["value"] = body["grams"]!.GetValue<double>() * 1000 };
        body.Remove("grams");
        return body;
    }

    private static JsonObject WithScale(JsonObject body)
    {
        body["scale"] = "unknown";
        return body;
    }

    private static LedgerEntry Frozen(string name) =>
        LedgerEntry.Parse(File.ReadAllBytes(Path.Combine(Folder, name + ".bin")));

    private static LedgerEntry Entry(string kind, string body) => LedgerAppender.Append(
        LedgerHead.Empty("laboratory"),
        [new EntryDraft(kind, DateTimeOffset.UnixEpoch, new Author("p", "Ada"), null, JsonNode.Parse(body)!.AsObject())]).Entries[0];

    private sealed class TemporaryFolder : IDisposable
    {
        public string Path { get; } = Directory.CreateTempSubdirectory("frozen-entries").FullName;

        public void Dispose() => Directory.Delete(Path, recursive: true);
    }
}
