using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger;
using ModelLab.Store.Writing;

namespace ModelLab.Store.Requests;

/// <summary>How a request with an idempotency key stands.</summary>
public enum IdempotencyState
{
    /// <summary>It is new, and now noted: carry it out, then complete or release it.</summary>
    Started,

    /// <summary>It was carried out: give the stored answer again.</summary>
    Answered,

    /// <summary>It is being carried out, or the server stopped while it was: what became of it is not known.</summary>
    Unfinished,

    /// <summary>The key was used for another request.</summary>
    OtherRequest,
}

/// <summary>An answer as sent.</summary>
/// <param name="Status">HTTP status.</param>
/// <param name="ContentType">Content type, or null.</param>
/// <param name="Body">Body.</param>
public sealed record StoredAnswer(int Status, string? ContentType, byte[] Body);

/// <summary>What is known of a request with an idempotency key.</summary>
/// <param name="State">How it stands.</param>
/// <param name="Answer">The answer, where it is <see cref="IdempotencyState.Answered"/>.</param>
public sealed record IdempotencyLookup(IdempotencyState State, StoredAnswer? Answer);

/// <summary>Remembers requests that came with an idempotency key, so that a repetition gives the first answer and acts once.</summary>
public sealed class IdempotencyRecords(StoreWriter writer, TimeProvider time)
{
    /// <summary>For how long keys are remembered.</summary>
    public static readonly TimeSpan Remembered = TimeSpan.FromDays(7);

    /// <summary>Notes a request, or tells how the one with its key stands.</summary>
    public Task<IdempotencyLookup> BeginAsync(string personId, string key, Sha256Hash requestHash, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var now = time.GetUtcNow();
            var limit = now - Remembered;
            await context.IdempotencyRecords.Where(r => r.CreatedAt < limit).ExecuteDeleteAsync();
            var row = await context.IdempotencyRecords.SingleOrDefaultAsync(r => r.PersonId == personId && r.Key == key);
            if (row is null)
            {
                context.IdempotencyRecords.Add(new IdempotencyRow { PersonId = personId, Key = key, RequestHash = requestHash, CreatedAt = now });
                return new IdempotencyLookup(IdempotencyState.Started, null);
            }

            if (row.RequestHash != requestHash)
            {
                return new IdempotencyLookup(IdempotencyState.OtherRequest, null);
            }

            return row.Status == 0
                ? new IdempotencyLookup(IdempotencyState.Unfinished, null)
                : new IdempotencyLookup(IdempotencyState.Answered, new StoredAnswer(row.Status, row.ContentType, row.Body));
        },
        cancellation);

    /// <summary>Stores the answer of a started request.</summary>
    public Task CompleteAsync(string personId, string key, StoredAnswer answer, CancellationToken cancellation) => writer.WriteAsync(
        async context =>
        {
            var row = await context.IdempotencyRecords.SingleAsync(r => r.PersonId == personId && r.Key == key);
            row.Status = answer.Status;
            row.ContentType = answer.ContentType;
            row.Body = answer.Body;
            return row.Status;
        },
        cancellation);

    /// <summary>Forgets a started request that did nothing, so that it may be sent again with its key.</summary>
    public Task ReleaseAsync(string personId, string key, CancellationToken cancellation) => writer.WriteAsync(
        context => context.IdempotencyRecords.Where(r => r.PersonId == personId && r.Key == key && r.Status == 0).ExecuteDeleteAsync(), cancellation);
}
