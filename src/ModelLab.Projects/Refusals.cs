namespace ModelLab.Projects;

/// <summary>Why a request was not carried out.</summary>
public enum RefusalKind
{
    /// <summary>The request itself is wrong; nothing was stored.</summary>
    Invalid,

    /// <summary>What was asked for does not exist, or the person may not know of it.</summary>
    NotFound,

    /// <summary>The person's role does not allow it.</summary>
    Forbidden,

    /// <summary>Something came between: the person acted on an older state.</summary>
    Stale,

    /// <summary>It contradicts what is stored.</summary>
    Conflict,

    /// <summary>What it needs was withdrawn and can no longer be read.</summary>
    Withdrawn,
}

/// <summary>One thing wrong, with its place where one exists.</summary>
/// <param name="Row">Row number in the source, or null.</param>
/// <param name="Column">Variable, field or term, or null.</param>
/// <param name="Message">What is wrong and what to do.</param>
public sealed record RefusalDetail(long? Row, string? Column, string Message);

/// <summary>A use case was refused. The message says what happened, what was kept and what to do.</summary>
public sealed class RefusedException(RefusalKind kind, string message, IReadOnlyList<RefusalDetail>? details = null) : Exception(message)
{
    /// <summary>Why.</summary>
    public RefusalKind Kind { get; } = kind;

    /// <summary>The places.</summary>
    public IReadOnlyList<RefusalDetail> Details { get; } = details ?? [];

    /// <summary>The request itself is wrong.</summary>
    public static RefusedException Invalid(string message, string? column = null) =>
        new(RefusalKind.Invalid, message, column is null ? null : [new RefusalDetail(null, column, message)]);

    /// <summary>There is no such thing.</summary>
    public static RefusedException NotFound(string what) => new(RefusalKind.NotFound, $"There is no {what} here, or you are not a member of its project.");
}
