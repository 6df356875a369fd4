using System.Security.Cryptography;
using System.Text.Json.Nodes;
using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Ledger;
using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;

namespace ModelLab.Store.Tests.Setting;

/// <summary>Entries of a small project, of kinds that the read model knows.</summary>
internal static class SmallProject
{
    public const string Id = "p1";
    public const string SourceId = "s1";

    public static readonly Author Analyst = new("ada", "Ada Anker");
    public static readonly DateTimeOffset At = new(2026, 3, 1, 9, 30, 0, TimeSpan.Zero);

    public static readonly byte[] Table = "weight,height\n61.5,1.62\n70.25,1.75\n"u8.ToArray();

    public static EntryDraft Opened(string name = "Catch and effort") => Draft(new ProjectOpened(name, "Does effort explain the catch?"));

    public static EntryDraft Comment(string id, string text = "Look at row 4.", string? replyTo = null) =>
        Draft(new CommentMade(id, new Place("project", Id, null), replyTo, text));

    public static EntryDraft Draft(IEntryBody body, string? reason = null, SealedContent? sealedContent = null) =>
        EntryKinds.Draft(body, At, Analyst, reason, sealedContent);

    public static SealedContent Sealed(string sourceId = SourceId, string fileName = "catch.csv") =>
        new(sourceId, RandomNumberGenerator.GetBytes(SealedCommitment.SaltLength), new JsonObject { ["fileName"] = fileName, ["ranges"] = new JsonArray(1.5, -2e-300, 0.1) });

    public static EntryDraft Received(StoredSource source, string sourceId = SourceId) => Draft(
        new SourceReceived(sourceId, source.Sha256, source.Bytes, 2, new CsvDialect("utf-8", false, ',', '.'), "csv/1"), null, Sealed(sourceId));

    public static EntryDraft Read(string datasetId = "d1", string sourceId = SourceId) => Draft(
        new DatasetRead(datasetId, sourceId, null, 2, [Variable("v1", "weight"), Variable("v2", "height")]), null, Sealed(sourceId, "columns"));

    public static VariableState Variable(string id, string name, string? label = null) =>
        new(id, name, label, null, VariableKind.Continuous, false, true, 0, 2, [], null, null, []);

    public static Task<AppendedBatch> CommitAsync(this TestStore store, params EntryDraft[] drafts) =>
        store.Projects.CommitAsync(new EntryBatch(Id, drafts, _ => { }), TestStore.Cancellation);

    /// <summary>Opens the project, takes a source with sealed parts and kept content in, and makes the read model change in several ways.</summary>
    public static async Task<AppendedBatch> FillAsync(this TestStore store)
    {
        await store.CommitAsync(Opened(), Draft(new MemberJoined("ben", "Ben Bode", Role.Reviewer)), Draft(new MemberJoined("cem", "Cem Can", Role.Reader)));
        var source = await store.Vault.StoreAsync(Id, SourceId, new MemoryStream(Table), TestStore.Cancellation);
        byte[] rows = [1, 0, 0, 0, 2, 0, 0, 0];
        await store.Projects.CommitAsync(
            new EntryBatch(Id, [Received(source), Read()], _ => { }, [new KeptContent(Sha256Hash.Of(rows), SourceId, rows)], [SourceId]), TestStore.Cancellation);
        return await store.CommitAsync(
            Draft(new VariableDescribed("d1", Variable("v1", "weight", "Weight of the catch"), ["label"]), "As on the form"),
            Comment("c1"), Comment("c2", replyTo: "c1"), Draft(new CommentSettled("c1"), "Row 4 was right."), Draft(new MemberLeft("cem"), "Moved on"));
    }
}
