namespace ModelLab.Web.Http;

/// <summary>A body that gives a reason and nothing else.</summary>
/// <param name="Reason">Why.</param>
public sealed record ReasonRequest(string? Reason);
