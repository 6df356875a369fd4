using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;

namespace ModelLab.Ledger.Tests;

/// <summary>A ledger of twelve entries with sealed parts, figures, nested bodies and text of many scripts.</summary>
internal static class SmallLedger
{
    public const string Id = "7f3c1d52-0a4e-4c39-9b0e-5d1f6a2b8c90";

    public static readonly Author Ada = new("person-1", "Ada Öström");
    public static readonly Author Bo = new("person-2", "薄 𝓑o \"the\" reviewer");

    private static readonly DateTimeOffset Start = new(2026, 3, 1, 9, 30, 0, TimeSpan.Zero);

    public static AppendedBatch Batch { get; } = Form(Id);

    public static AppendedBatch Form(string ledgerId) => LedgerAppender.Append(LedgerHead.Empty(ledgerId), Drafts());

    public static IReadOnlyList<EntryDraft> Drafts() =>
    [
        Draft(1, "project/1", Ada, null, """{"question":"Does x explain y?","name":"Prüfung – ελ"}"""),
        Draft(2, "source/1", Ada, null, """{"bytes":20480,"sha256":"ab54d286f2a1c0de","rows":252}"""),
        Draft(3, "dictionary/1", Ada, "Names as in the study's protocol", "{}", Sealed(3, """{"categories":["männlich","weiblich","大"]}""")),
        Draft(4, "plan/1", Ada, "Fixed before looking", """{"outcome":"y","terms":["a","b","c"],"alpha":0.05}"""),
        Draft(5, "data-decision/1", Bo, "Row 39 is a typing error 😀", """{"step":1,"rows":[39],"kind":"exclude"}"""),
        Draft(6, "path/1", Ada, "Start from all candidates", """{"path":"p1"}"""),
        Draft(7, "revision/1", Ada, null, """{"path":"p1","number":1,"r2":0.7489999999999999,"s":4.31e-7,"big":"9007199254740993"}"""),
        Draft(8, "revision/1", Ada, "Largest p", """{"path":"p1","number":2,"removed":"c","p":0.6312,"terms":{"a":{"b":-1.5,"se":0.25},"b":{"b":1e+21,"se":1e-7}}}"""),
        Draft(9, "comment/1", Bo, null, """{"text":"Why\nnot\tb?","at":{"revision":2,"term":"b"}}"""),
        Draft(10, "finding-answer/1", Ada, "Discussed on the ward", """{"finding":"collinearity","answer":"kept"}"""),
        Draft(11, "data-decision/1", Ada, "Codes joined", """{"step":2,"cells":0}""", Sealed(11, """{"from":["1","2"],"to":"any","deep":[[[{"a":null,"b":true}]]]}""")),
        Draft(12, "sign-off/1", Bo, "Read in full", """{"revision":2,"meaning":"reviewed"}"""),
    ];

    public static SealedContent Sealed(byte seed, string content) => new(
        "source-1", [.. Enumerable.Range(0, 32).Select(i => (byte)((seed * 37) + (i * 11)))], JsonNode.Parse(content)!.AsObject());

    private static EntryDraft Draft(int minute, string kind, Author by, string? reason, string body, SealedContent? part = null) =>
        new(kind, Start.AddMinutes(minute).AddTicks(minute * 1230), by, reason, JsonNode.Parse(body)!.AsObject(), part);
}
