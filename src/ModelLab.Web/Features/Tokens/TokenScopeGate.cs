using ModelLab.Web.Http;

namespace ModelLab.Web.Features.Tokens;

/// <summary>Marks an endpoint that takes a body by POST but stores nothing, so that a token of read scope may call it.</summary>
public sealed class ReadsOnly;

/// <summary>Refuses a token of read scope wherever something would be stored. The use case refuses it too; here it is refused before a body is read.</summary>
public sealed class TokenScopeGate(RequestDelegate next)
{
    /// <summary>Lets a request through, or answers 403.</summary>
    public Task InvokeAsync(HttpContext context)
    {
        var writes = !HttpMethods.IsGet(context.Request.Method) && !HttpMethods.IsHead(context.Request.Method)
            && context.GetEndpoint()?.Metadata.GetMetadata<ReadsOnly>() is null;
        return writes && context.User.Identity?.IsAuthenticated == true && !context.User.ToCaller().MayWrite
            ? Problems.WriteAsync(context, StatusCodes.Status403Forbidden, "readOnlyToken", "This token may only read. Use one of write scope. Nothing was stored.")
            : next(context);
    }
}
