using System.Collections.Concurrent;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;
using Microsoft.AspNetCore.DataProtection;
using ModelLab.Ledger;
using ModelLab.Store.Requests;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Http;

/// <summary>
/// Honours <c>Idempotency-Key</c> on POST: the same request with the same key acts once and is answered twice. A request is the same
/// when method, path, query and body are; of a multipart body, whose boundaries differ from one sending to the next, when the names
/// and contents of its parts are. Keys belong to a person. What is kept of an answer is encrypted, for an answer may hold a secret.
/// </summary>
public sealed class IdempotencyGate(RequestDelegate next, IdempotencyRecords records, IDataProtectionProvider protection, StorageSettings storage)
{
    /// <summary>The header that carries the key.</summary>
    public const string KeyHeader = "Idempotency-Key";

    /// <summary>The header that marks an answer given again.</summary>
    public const string ReplayedHeader = "Idempotency-Replayed";

    private const int LongestKey = 200;

    private readonly IDataProtector protector = protection.CreateProtector("ModelLab.Answers");
    private readonly ConcurrentDictionary<string, bool> running = new(StringComparer.Ordinal);

    /// <summary>Carries a request out, or gives its earlier answer again.</summary>
    public async Task InvokeAsync(HttpContext context)
    {
        var header = context.Request.Headers[KeyHeader];
        if (header.Count == 0 || !HttpMethods.IsPost(context.Request.Method) || context.GetEndpoint() is null || context.User.Identity?.IsAuthenticated != true)
        {
            await next(context);
            return;
        }

        var key = header.ToString();
        if (header.Count > 1 || key.Length is 0 or > LongestKey || key.Any(c => c is < '!' or > '~'))
        {
            await Problems.WriteAsync(context, StatusCodes.Status400BadRequest, "malformed", $"{KeyHeader} is one key of 1 to {LongestKey} visible ASCII characters without blanks, e.g. a UUID.");
            return;
        }

        var person = context.User.PersonId();
        if (await FingerprintAsync(context) is not { } request)
        {
            await Problems.WriteAsync(context, ProblemTranslation.TooLarge(context, storage.MaximumRequestBytes));
            return;
        }

        var turn = $"{person} {key}";
        if (!running.TryAdd(turn, true))
        {
            await UnfinishedAsync(context, isRunning: true);
            return;
        }

        try
        {
            var found = await records.BeginAsync(person, key, request, context.RequestAborted);
            await (found.State switch
            {
                IdempotencyState.Started => CarryOutAsync(context, person, key),
                IdempotencyState.Answered => ReplayAsync(context, found.Answer!),
                IdempotencyState.OtherRequest => OtherRequestAsync(context),
                _ => UnfinishedAsync(context, isRunning: false),
            });
        }
        finally
        {
            running.TryRemove(turn, out _);
        }
    }

    private async Task CarryOutAsync(HttpContext context, string person, string key)
    {
        // Whoever sends a key will ask again after a lost connection: the act runs to its end, so that there is an answer then.
        context.RequestAborted = CancellationToken.None;
        var answer = context.Response.Body;
        using var buffer = new MemoryStream();
        context.Response.Body = buffer;
        try
        {
            await next(context);
        }
        catch (Exception e) when (!context.Response.HasStarted && ProblemTranslation.OfRefusal(context, e) is not null)
        {
            await Problems.WriteAsync(context, ProblemTranslation.OfRefusal(context, e)!);
        }
        catch (IOException)
        {
            // The body broke off or the disk is full: nothing was stored. Any other fault leaves the key unfinished, since it may have come after the act.
            context.Response.Body = answer;
            await records.ReleaseAsync(person, key, CancellationToken.None);
            throw;
        }
        finally
        {
            context.Response.Body = answer;
        }

        var body = buffer.ToArray();
        if (IsKept(context.Response.StatusCode))
        {
            var kept = JsonSerializer.SerializeToUtf8Bytes(new KeptAnswer(context.Features.Get<ContentFingerprint>()?.Hash, body), ApiJson.Options);
            await records.CompleteAsync(person, key, new StoredAnswer(context.Response.StatusCode, context.Response.ContentType, protector.Protect(kept)), CancellationToken.None);
        }
        else
        {
            await records.ReleaseAsync(person, key, CancellationToken.None);
        }

        await answer.WriteAsync(body);
    }

    /// <summary>Kept is what the use case decided. What never came to it (not allowed, too large, too often) may be sent again with its key.</summary>
    private static bool IsKept(int status) =>
        status is >= 200 and < 300 or StatusCodes.Status409Conflict or StatusCodes.Status410Gone or StatusCodes.Status422UnprocessableEntity;

    private async Task ReplayAsync(HttpContext context, StoredAnswer stored)
    {
        KeptAnswer? kept = null;
        try
        {
            kept = JsonSerializer.Deserialize<KeptAnswer>(protector.Unprotect(stored.Body), ApiJson.Options);
        }
        catch (CryptographicException)
        {
            // The keys were replaced since: the answer cannot be read any more.
        }

        if (kept is null)
        {
            await UnfinishedAsync(context, isRunning: false);
            return;
        }

        if (kept.Content is not null && kept.Content != await UploadReader.DrainAsync(context))
        {
            await OtherRequestAsync(context);
            return;
        }

        context.Response.StatusCode = stored.Status;
        context.Response.ContentType = stored.ContentType;
        context.Response.Headers[ReplayedHeader] = "true";
        await context.Response.Body.WriteAsync(kept.Body);
    }

    private static Task OtherRequestAsync(HttpContext context) => Problems.WriteAsync(
        context, StatusCodes.Status422UnprocessableEntity, "keyReused", $"This {KeyHeader} was sent with another request before. Give every act a key of its own. Nothing was stored.");

    private static Task UnfinishedAsync(HttpContext context, bool isRunning) => Problems.WriteAsync(
        context, StatusCodes.Status409Conflict, "unfinished",
        isRunning
            ? $"The request with this {KeyHeader} is being carried out. Ask again in a moment for its answer."
            : $"The request with this {KeyHeader} was begun, and its answer is not known. Look whether its act stands in the ledger; if not, send it with a new key.");

    /// <summary>The hash of a request, or null where a body that is no upload is larger than such bodies may be.</summary>
    private async Task<Sha256Hash?> FingerprintAsync(HttpContext context)
    {
        var request = context.Request;
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        hash.AppendData(Encoding.UTF8.GetBytes($"{request.Method}\n{request.Path}\n{request.QueryString}\n"));
        if (!UploadReader.IsUpload(request))
        {
            // Held in memory, so the limit is kept here too: the endpoint of uploads has raised the server's own for itself.
            var body = new MemoryStream();
            var buffer = new byte[1 << 16];
            for (int read; (read = await request.Body.ReadAsync(buffer, context.RequestAborted)) > 0;)
            {
                if (body.Length + read > storage.MaximumRequestBytes)
                {
                    return null;
                }

                body.Write(buffer, 0, read);
            }

            hash.AppendData(body.GetBuffer().AsSpan(0, (int)body.Length));
            body.Position = 0;
            request.Body = body;
        }

        return new Sha256Hash(hash.GetHashAndReset());
    }

    private sealed record KeptAnswer(string? Content, byte[] Body);
}

/// <summary>What the parts of a multipart body add up to; set by the endpoint that read them.</summary>
/// <param name="Hash">SHA-256 over names and contents, hexadecimal.</param>
public sealed record ContentFingerprint(string Hash);
