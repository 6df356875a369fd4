using System.Text.Json;
using System.Text.RegularExpressions;
using Microsoft.AspNetCore.Http.Features;
using Microsoft.AspNetCore.Mvc;
using Microsoft.Net.Http.Headers;
using ModelLab.Intake;
using ModelLab.Projects;
using ModelLab.Statistics.Designs;
using ModelLab.Store.Vault;
using ModelLab.Store.Writing;

namespace ModelLab.Web.Http;

/// <summary>Which exception becomes which problem.</summary>
public static partial class ProblemTranslation
{
    /// <summary>The problem of an exception, or null where it is a fault of the server.</summary>
    public static ProblemDetails? OfRefusal(HttpContext context, Exception exception) => exception switch
    {
        RefusedException refused => Problems.Of(context, Status(refused.Kind), Word(refused.Kind), refused.Message, refused.Details),
        ModelRefusedException model => OfModel(context, model),
        IntakeRefusedException intake => Problems.Of(
            context, StatusCodes.Status422UnprocessableEntity, "unreadableFile", intake.Message,
            [.. intake.Problems.Select(p => new RefusalDetail(p.Row, p.Column, p.Message))]),
        BadHttpRequestException { InnerException: JsonException json } => OfJson(context, json),
        BadHttpRequestException bad => OfRequest(context, bad),
        JsonException json => OfJson(context, json),
        InvalidOperationException when HasUnknownCharset(context.Request) => Problems.Of(
            context, StatusCodes.Status415UnsupportedMediaType, "mediaType", "The charset of the body's Content-Type is not known. Send UTF-8."),
        InvalidDataException data when IsUpload(context) => Problems.Of(
            context, StatusCodes.Status400BadRequest, "malformed", $"The multipart body cannot be read: {data.Message}"),
        _ => null,
    };

    /// <summary>The problem of a fault. Of what happened inside it says nothing; the log has it under the trace id.</summary>
    public static ProblemDetails OfFault(HttpContext context, Exception exception)
    {
        if (exception is VaultDamagedException damaged)
        {
            return Problems.Of(
                context, StatusCodes.Status500InternalServerError, "damaged",
                $"{damaged.Message} The store was changed from outside. Whoever runs the server runs its check and restores a backup.");
        }

        if (exception is StorageFailedException { Full: false } storage)
        {
            return Problems.Of(context, StatusCodes.Status503ServiceUnavailable, "storage", $"{storage.Message} Nothing of this was stored; send the request again in a moment.");
        }

        if (exception is StorageFailedException || IsDiskFull(exception))
        {
            return Problems.Of(
                context, StatusCodes.Status507InsufficientStorage, "diskFull",
                "The server's disk is full, so that this was not stored. What was stored before is safe. Tell whoever runs the server, then send the request again.");
        }

        var kept = HttpMethods.IsGet(context.Request.Method) || HttpMethods.IsHead(context.Request.Method)
            ? "It was a request for reading, so nothing was changed."
            : "An act is recorded whole or not at all: look whether it stands in the ledger before you send it again, or send it again with the same Idempotency-Key.";
        return Problems.Of(
            context, StatusCodes.Status500InternalServerError, "fault",
            $"Something went wrong on the server. {kept} Whoever runs the server finds the cause in the log under the trace id.");
    }

    private static int Status(RefusalKind kind) => kind switch
    {
        RefusalKind.Invalid => StatusCodes.Status422UnprocessableEntity,
        RefusalKind.NotFound => StatusCodes.Status404NotFound,
        RefusalKind.Forbidden => StatusCodes.Status403Forbidden,
        RefusalKind.Stale or RefusalKind.Conflict => StatusCodes.Status409Conflict,
        RefusalKind.Withdrawn => StatusCodes.Status410Gone,
        _ => throw new ArgumentOutOfRangeException(nameof(kind), kind, "No status is given for this kind of refusal."),
    };

    private static string Word(RefusalKind kind) => JsonNamingPolicy.CamelCase.ConvertName(kind.ToString());

    private static ProblemDetails OfModel(HttpContext context, ModelRefusedException model)
    {
        IReadOnlyList<RefusalDetail> places =
        [
            .. model.Aliases.Select(a => new RefusalDetail(null, a.Column, $"{a.Column} is already determined by {string.Join(", ", a.DeterminedBy)}.")),
            .. model.Aliases.Count > 0 ? [] : model.Variables.Select(v => new RefusalDetail(null, v, model.Message)),
        ];
        return Problems.Of(context, StatusCodes.Status422UnprocessableEntity, JsonNamingPolicy.CamelCase.ConvertName(model.Refusal.ToString()), model.Message, places);
    }

    private static ProblemDetails OfJson(HttpContext context, JsonException json)
    {
        var place = JsonProblems.Explain(json);
        return Problems.Of(context, StatusCodes.Status400BadRequest, "malformed", $"The body of the request cannot be taken. {place.Message} Nothing was stored.", [place]);
    }

    private static ProblemDetails OfRequest(HttpContext context, BadHttpRequestException bad)
    {
        switch (bad.StatusCode)
        {
            case StatusCodes.Status413PayloadTooLarge:
                return TooLarge(context, context.Features.Get<IHttpMaxRequestBodySizeFeature>()?.MaxRequestBodySize);
            case StatusCodes.Status415UnsupportedMediaType:
                return Problems.Of(context, bad.StatusCode, "mediaType", StatusProblems.MediaTypes);
        }

        if (Unbound().Match(bad.Message) is { Success: true } unbound)
        {
            var name = unbound.Groups["name"].Value;
            var message = $"The parameter '{name}' cannot be '{unbound.Groups["value"].Value}'.";
            return Problems.Of(context, StatusCodes.Status400BadRequest, "malformed", message, [new RefusalDetail(null, name, message)]);
        }

        if (Required().Match(bad.Message) is { Success: true } required)
        {
            var isBody = required.Groups["source"].Value.Contains("body", StringComparison.Ordinal);
            var name = isBody ? "$" : required.Groups["name"].Value;
            var message = isBody ? "A body in JSON is needed here." : $"The parameter '{name}' is needed here.";
            return Problems.Of(context, StatusCodes.Status400BadRequest, "malformed", message, [new RefusalDetail(null, name, message)]);
        }

        return Problems.Of(context, bad.StatusCode, "malformed", "The request cannot be read as HTTP with a body as described under /openapi/v1.json.");
    }

    /// <summary>The problem of a body that is too large.</summary>
    public static ProblemDetails TooLarge(HttpContext context, long? limit) => Problems.Of(
        context, StatusCodes.Status413PayloadTooLarge, "tooLarge",
        $"The body is larger than {(limit is { } bytes ? $"the {bytes} bytes" : "what is")} allowed here. Nothing was stored.");

    private static bool HasUnknownCharset(HttpRequest request) =>
        MediaTypeHeaderValue.TryParse(request.ContentType, out var type) && type is { Encoding: null, Charset.Length: > 0 };

    private static bool IsUpload(HttpContext context) =>
        context.Request.ContentType?.StartsWith("multipart/", StringComparison.OrdinalIgnoreCase) == true;

    private static bool IsDiskFull(Exception exception)
    {
        const int noSpaceOnDevice = 28;
        const int windowsDiskFull = unchecked((int)0x80070070);
        const int sqliteFull = 13;
        for (var e = exception; e is not null; e = e.InnerException)
        {
            if ((e is IOException io && io.HResult is noSpaceOnDevice or windowsDiskFull)
                || (e is Microsoft.Data.Sqlite.SqliteException sqlite && sqlite.SqliteErrorCode == sqliteFull))
            {
                return true;
            }
        }

        return false;
    }

    [GeneratedRegex("^Failed to bind parameter \"(?:[^\"]* )?(?<name>[^\" ]+)\" from \"(?<value>.*)\"")]
    private static partial Regex Unbound();

    [GeneratedRegex("""parameter "(?:[^"]* )?(?<name>[^" ]+)"(?<source>.*no body was provided.*| was not provided from .*)""")]
    private static partial Regex Required();
}
