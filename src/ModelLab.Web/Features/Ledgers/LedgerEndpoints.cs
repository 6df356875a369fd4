using System.Security.Claims;
using System.Text.Json.Nodes;
using ModelLab.Ledger;
using ModelLab.Ledger.Canonical;
using ModelLab.Ledger.Entries;
using ModelLab.Ledger.Receipts;
using ModelLab.Ledger.Verification;
using ModelLab.Projects;
using ModelLab.Projects.Records;
using ModelLab.Projects.Replaying;
using ModelLab.Store.Keys;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Ledgers;

/// <summary>The ledger of a project: read, verify, sign its head, compute everything again.</summary>
public static class LedgerEndpoints
{
    /// <summary>Maps the endpoints.</summary>
    public static void MapLedgers(this IEndpointRouteBuilder api)
    {
        var group = api.MapGroup("/projects/{project}").WithTags("Ledger");
        group.MapGet("/ledger", async (string project, long? from, ClaimsPrincipal user, ReadLedger ledger, CancellationToken cancellation) =>
                TypedResults.Ok(LedgerAnswer.Of(await ledger.PageAsync(user.ToCaller(), project, from ?? 1, cancellation))))
            .WithName("ReadLedger")
            .WithSummary($"Entries from a number on, at most {ReadLedger.PageSize} at a time; `next` is the number to go on from, or null at the end.")
            .WithProblems(400, 404, 422);
        group.MapPost("/ledger/verify", VerifyAsync)
            .WithName("VerifyLedger")
            .WithSummary("Verifies every stored entry: form, numbers, chain, tree, head. Stores nothing.")
            .WithDescription("With receipts kept elsewhere in `receipts`, what they saw must still stand where it stood: only they show that nothing was cut off at the end.")
            .Produces<VerificationAnswer>()
            .WithMetadata(new ReadsOnly())
            .WithProblems(400, 404, 422);
        group.MapGet("/ledger/receipt", ReceiptAsync)
            .WithName("ReadReceipt")
            .WithSummary("A signed receipt of where the ledger stands, to be kept elsewhere: it proves later that nothing before it was cut, changed or moved.")
            .Produces<ReceiptFile>()
            .WithProblems(404);
        group.MapPost("/replay", async (string project, ClaimsPrincipal user, ReplayProject replay, CancellationToken cancellation) =>
                TypedResults.Ok(await replay.ExecuteAsync(user.ToCaller(), project, cancellation)))
            .WithName("ReplayProject")
            .WithSummary("Computes every revision again from the sources by the recorded decisions and compares. Stores nothing.")
            .WithMetadata(new ReadsOnly())
            .WithProblems(404, 410);
    }

    private static async Task<IResult> VerifyAsync(
        string project, VerifyRequest? request, ClaimsPrincipal user, ReadLedger ledger, ReceiptSigningKey signing, CancellationToken cancellation)
    {
        using var key = signing.Open();
        var verifier = new ReceiptVerifier([ReceiptKey.Of(key).Fingerprint]);
        var receipts = (request?.Receipts ?? []).Select(Parse).ToList();
        return Results.Ok(VerificationAnswer.Of(await ledger.VerifyAsync(user.ToCaller(), project, receipts, verifier, cancellation)));
    }

    private static Receipt Parse(JsonObject? receipt, int place)
    {
        try
        {
            return Receipt.Parse(CanonicalJson.Serialise(receipt));
        }
        catch (Exception e) when (e is FormatException or ArgumentException)
        {
            // Not a receipt, or a value that has no canonical form, such as a number beyond what a double holds.
            throw RefusedException.Invalid($"This is no receipt of this program: {e.Message}", $"receipts[{place}]");
        }
    }

    private static async Task<IResult> ReceiptAsync(
        string project, ClaimsPrincipal user, ReadLedger ledger, ReceiptSigningKey signing, TimeProvider clock, CancellationToken cancellation)
    {
        var head = await ledger.HeadAsync(user.ToCaller(), project, cancellation);
        using var key = signing.Open();
        var receipt = new ReceiptSigner(key).Sign(head, clock.GetUtcNow());

        // The bytes of the file itself, so that what is saved can be checked as it is.
        return Results.Bytes(receipt.Write(), "application/json", $"receipt-{project}-{receipt.Count}.json");
    }
}

/// <summary>Some entries of a ledger.</summary>
/// <param name="Entries">In order.</param>
/// <param name="Count">Entries of the whole ledger.</param>
/// <param name="Next">Number from which to go on, or null at the end.</param>
public sealed record LedgerAnswer(IReadOnlyList<EntryAnswer> Entries, long Count, long? Next)
{
    /// <summary>The answer for a page of a ledger.</summary>
    public static LedgerAnswer Of(LedgerPage page) => new([.. page.Entries.Select(EntryAnswer.Of)], page.Count, page.Next);
}

/// <summary>An entry.</summary>
/// <param name="Id">Its number as text: entries are known by their number.</param>
/// <param name="Number">Its number, from 1 without gaps.</param>
/// <param name="Kind">Versioned name, e.g. <c>revision/1</c>.</param>
/// <param name="At">When.</param>
/// <param name="By">Who, with the name as it was then.</param>
/// <param name="Reason">Why, or null.</param>
/// <param name="Body">What.</param>
/// <param name="Sealed">Commitment to what was copied from a source, or null.</param>
/// <param name="Previous">Hash of the entry before.</param>
/// <param name="Hash">Its hash.</param>
public sealed record EntryAnswer(
    string Id, long Number, string Kind, DateTimeOffset At, Author By, string? Reason, JsonObject Body, SealedReference? Sealed, Sha256Hash Previous, Sha256Hash Hash)
{
    /// <summary>The answer for an entry.</summary>
    public static EntryAnswer Of(LedgerEntry entry) => new(
        entry.Number.ToString(System.Globalization.CultureInfo.InvariantCulture), entry.Number, entry.Kind, entry.At, entry.By, entry.Reason, entry.Body,
        entry.Sealed, entry.Previous, entry.Hash);
}

/// <summary>What a verification found.</summary>
/// <param name="Ok">Nothing wrong.</param>
/// <param name="Entries">Entries read.</param>
/// <param name="Head">Hash of the last entry, computed from the entries up to the first bad one.</param>
/// <param name="Root">Root of the Merkle tree over them (RFC 9162).</param>
/// <param name="FirstBad">Number of the first bad entry, or null.</param>
/// <param name="Problem">What is wrong with it, or null.</param>
/// <param name="Receipts">What the receipts sent show, in their order.</param>
public sealed record VerificationAnswer(
    bool Ok, long Entries, Sha256Hash Head, Sha256Hash Root, long? FirstBad, string? Problem, IReadOnlyList<ReceiptAnswer> Receipts)
{
    /// <summary>The answer for a verification.</summary>
    public static VerificationAnswer Of(VerificationResult result) =>
        new(result.Ok, result.Entries, result.Head.LastHash, result.Head.Root, result.FirstBad, result.Problem,
            [.. result.Receipts.Select(r => new ReceiptAnswer(r.Receipt.Count, r.Receipt.At, r.Check.Ok, r.Check.Problem))]);
}

/// <summary>Receipts to verify a ledger against.</summary>
/// <param name="Receipts">The files as they were received, in any order.</param>
public sealed record VerifyRequest(IReadOnlyList<JsonObject>? Receipts);

/// <summary>What one receipt shows.</summary>
/// <param name="Count">Entries that the ledger had when it was given.</param>
/// <param name="At">When it was given.</param>
/// <param name="Ok">It was signed by this server, and what it saw still stands.</param>
/// <param name="Problem">What is wrong, or null.</param>
public sealed record ReceiptAnswer(long Count, DateTimeOffset At, bool Ok, string? Problem);

/// <summary>The members of a receipt's file.</summary>
public sealed record ReceiptFile(
    string Algorithm, string At, long Count, string HeadHash, string KeyId, string Ledger, string PublicKey, string Root, string Signature, int Version);
