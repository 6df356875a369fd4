using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Tokens;

/// <summary>Marks an endpoint that takes a body by POST but stores nothing, so that a token of read scope may call it.</summary>
public sealed class ReadsOnly;

/// <summary>Marks an endpoint that is for a signed-in session alone, so that no token may call it.</summary>
public sealed class SessionOnly;

/// <summary>
/// Refuses a token of read scope wherever something would be stored, and any token where a session is asked for. It stands before a
/// body is read and before an earlier answer is looked up by its key, so that neither comes to a token that may not ask for it.
/// </summary>
public sealed class TokenScopeGate(RequestDelegate next)
{
    /// <summary>Lets a request through, or answers 403.</summary>
    public Task InvokeAsync(HttpContext context)
    {
        if (context.User.TokenExpiry() is null)
        {
            return next(context);
        }

        var writes = !HttpMethods.IsGet(context.Request.Method) && !HttpMethods.IsHead(context.Request.Method)
            && context.GetEndpoint()?.Metadata.GetMetadata<ReadsOnly>() is null;
        if (writes && !context.User.ToCaller().MayWrite)
        {
            return Problems.WriteAsync(context, StatusCodes.Status403Forbidden, "readOnlyToken", "This token may only read. Use one of write scope. Nothing was stored.");
        }

        return context.GetEndpoint()?.Metadata.GetMetadata<SessionOnly>() is null
            ? next(context)
            : Problems.WriteAsync(
                context, StatusCodes.Status403Forbidden, "sessionOnly",
                "A token is issued by a person who is signed in, or on the server with create-token; a token cannot make another. Nothing was stored.");
    }
}
