using System.Text.Json;
using ModelLab.Projects;

namespace ModelLab.Web.Http;

/// <summary>A body that came as JSON or as a form.</summary>
/// <param name="Value">What it says.</param>
/// <param name="IsForm">Whether it came as a form, so that the answer is a redirection.</param>
public sealed record ReadBody<T>(T Value, bool IsForm);

/// <summary>Reads bodies that may be JSON or a form.</summary>
public static class FormBody
{
    /// <summary>Media type of a form.</summary>
    public const string MediaType = "application/x-www-form-urlencoded";

    /// <summary>Whether a request carries a form.</summary>
    public static bool IsForm(HttpRequest request) => request.ContentType?.StartsWith(MediaType, StringComparison.OrdinalIgnoreCase) == true;

    /// <summary>Reads a body.</summary>
    /// <param name="request">The request.</param>
    /// <param name="fromForm">Makes the value from the fields of a form; a missing field is refused.</param>
    /// <param name="cancellation">Withdraws the request.</param>
    /// <exception cref="RefusedException">A field of the form is missing.</exception>
    /// <exception cref="JsonException">The body is no such JSON.</exception>
    public static async Task<ReadBody<T>> ReadAsync<T>(HttpRequest request, Func<Func<string, string>, T> fromForm, CancellationToken cancellation)
        where T : class
    {
        if (IsForm(request))
        {
            var form = await request.ReadFormAsync(cancellation);
            return new ReadBody<T>(
                fromForm(name => form.TryGetValue(name, out var value) && value.Count == 1 ? value.ToString() : throw RefusedException.Invalid($"Fill in the field '{name}'.", name)),
                IsForm: true);
        }

        if (!request.HasJsonContentType())
        {
            throw new BadHttpRequestException("The body has a media type that is not read here.", StatusCodes.Status415UnsupportedMediaType);
        }

        var value = await JsonSerializer.DeserializeAsync<T>(request.Body, ApiJson.Options, cancellation);
        return new ReadBody<T>(value ?? throw new JsonException("The body is null; send an object."), IsForm: false);
    }
}
