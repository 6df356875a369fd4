using System.Security.Cryptography;
using System.Text;
using Microsoft.AspNetCore.WebUtilities;
using Microsoft.Extensions.Primitives;
using Microsoft.Net.Http.Headers;

namespace ModelLab.Web.Http;

/// <summary>One part of a multipart body. Its content is read from the network as it is asked for.</summary>
/// <param name="Name">Name of the field.</param>
/// <param name="FileName">Name of the file, or null for a plain field.</param>
/// <param name="Content">The content; read it before asking for the next part.</param>
public sealed record UploadPart(string Name, string? FileName, Stream Content)
{
    private const int LongestField = 4096;

    /// <summary>The text of a plain field.</summary>
    /// <exception cref="InvalidDataException">It is too long.</exception>
    public async Task<string> ReadTextAsync(CancellationToken cancellation)
    {
        var bytes = new byte[LongestField + 1];
        var length = await Content.ReadAtLeastAsync(bytes, bytes.Length, throwOnEndOfStream: false, cancellation);
        return length > LongestField
            ? throw new InvalidDataException($"The field '{Name}' has more than {LongestField} bytes.")
            : Encoding.UTF8.GetString(bytes, 0, length);
    }
}

/// <summary>Reads a multipart body part by part, keeping nothing of it in memory or on disk.</summary>
public sealed class UploadReader : IDisposable
{
    private const int LongestBoundary = 200;

    private readonly MultipartReader reader;
    private readonly List<string> parts = [];
    private readonly long maximumBytes;
    private HashingStream? current;

    /// <summary>Begins to read.</summary>
    /// <param name="request">The request.</param>
    /// <param name="maximumBytes">Most bytes of one part.</param>
    /// <exception cref="BadHttpRequestException">The body is not multipart/form-data.</exception>
    public UploadReader(HttpRequest request, long maximumBytes)
    {
        if (!IsUpload(request) || !MediaTypeHeaderValue.TryParse(request.ContentType, out var type)
            || HeaderUtilities.RemoveQuotes(type.Boundary) is not { Length: > 0 and <= LongestBoundary } boundary)
        {
            throw new BadHttpRequestException("The body is no multipart/form-data.", StatusCodes.Status415UnsupportedMediaType);
        }

        reader = new MultipartReader(boundary.ToString(), request.Body);
        this.maximumBytes = maximumBytes;
    }

    /// <summary>SHA-256 over names and contents of all parts read, hexadecimal.</summary>
    public string ContentHash => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(string.Join('\n', parts))));

    /// <summary>Whether a request carries a multipart body.</summary>
    public static bool IsUpload(HttpRequest request) => request.ContentType?.StartsWith("multipart/form-data", StringComparison.OrdinalIgnoreCase) == true;

    /// <summary>Reads a whole body for its hash alone.</summary>
    public static async Task<string> DrainAsync(HttpContext context)
    {
        using var upload = new UploadReader(context.Request, long.MaxValue);
        while (await upload.NextAsync(context.RequestAborted) is not null)
        {
            // The next part reads this one to its end.
        }

        return upload.ContentHash;
    }

    /// <summary>The next part, or null after the last. What was not read of the part before is read and dropped.</summary>
    /// <exception cref="InvalidDataException">The body is no well-formed multipart body, or breaks off.</exception>
    public async Task<UploadPart?> NextAsync(CancellationToken cancellation)
    {
        if (current is not null)
        {
            await current.CopyToAsync(Stream.Null, cancellation);
            parts.Add(current.Finish());
            await current.DisposeAsync();
            current = null;
        }

        MultipartSection? section;
        try
        {
            section = await reader.ReadNextSectionAsync(cancellation);
        }
        catch (IOException e) when (e is not BadHttpRequestException && e.Message.Contains("Unexpected end", StringComparison.Ordinal))
        {
            throw new InvalidDataException("The body breaks off before its closing boundary.", e);
        }

        if (section is null)
        {
            return null;
        }

        if (!ContentDispositionHeaderValue.TryParse(section.ContentDisposition, out var disposition) || StringSegment.IsNullOrEmpty(disposition.Name))
        {
            throw new InvalidDataException("A part has no Content-Disposition with a name.");
        }

        var name = HeaderUtilities.RemoveQuotes(disposition.Name).ToString();
        var fileName = disposition.FileNameStar.HasValue ? disposition.FileNameStar : HeaderUtilities.RemoveQuotes(disposition.FileName);
        current = new HashingStream(section.Body, name, fileName.HasValue ? fileName.ToString() : null, maximumBytes);
        return new UploadPart(name, fileName.HasValue ? LastSegment(fileName.ToString()) : null, current);
    }

    /// <summary>Lets go of the part that is being read; the request itself is the server's.</summary>
    public void Dispose() => current?.Dispose();

    /// <summary>Some browsers send a whole path; the name is its last part.</summary>
    private static string LastSegment(string fileName) => fileName[(fileName.LastIndexOfAny(['/', '\\']) + 1)..];
}
