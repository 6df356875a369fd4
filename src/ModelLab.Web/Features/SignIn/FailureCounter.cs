using System.Collections.Concurrent;

namespace ModelLab.Web.Features.SignIn;

/// <summary>
/// Counts failures under a key (an address, an e-mail address without an account) and locks the key out for a while. In memory:
/// a restart forgets it; the lock-out of accounts stands in the database.
/// </summary>
/// <param name="limit">Failures after which a key is locked out.</param>
/// <param name="span">How far back failures count, and how long a lock-out lasts.</param>
/// <param name="clock">The clock.</param>
public sealed class FailureCounter(int limit, TimeSpan span, TimeProvider clock)
{
    private const int SweepAbove = 10_000;

    private readonly ConcurrentDictionary<string, Failures> failures = new(StringComparer.Ordinal);

    /// <summary>Until when a key is locked out, or null.</summary>
    public DateTimeOffset? LockedUntil(string key) =>
        failures.TryGetValue(key, out var found) && found.Count >= limit && found.Until > clock.GetUtcNow() ? found.Until : null;

    /// <summary>Counts one failure more.</summary>
    public void Failed(string key)
    {
        var now = clock.GetUtcNow();
        failures.AddOrUpdate(key, _ => new Failures(1, now + span), (_, old) => new Failures(old.Until > now ? old.Count + 1 : 1, now + span));
        if (failures.Count > SweepAbove)
        {
            foreach (var (stale, _) in failures.Where(f => f.Value.Until <= now))
            {
                failures.TryRemove(stale, out _);
            }
        }
    }

    /// <summary>Forgets a key's failures.</summary>
    public void Succeeded(string key) => failures.TryRemove(key, out _);

    private sealed record Failures(int Count, DateTimeOffset Until);
}
