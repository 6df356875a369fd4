using Microsoft.EntityFrameworkCore.Storage.ValueConversion;

namespace ModelLab.Store.Model;

/// <summary>Times as whole microseconds since 1970-01-01 UTC: sortable, the same on every database.</summary>
internal sealed class UtcMicroseconds() : ValueConverter<DateTimeOffset, long>(
    time => (time.UtcTicks - DateTimeOffset.UnixEpoch.Ticks) / TimeSpan.TicksPerMicrosecond,
    stored => new DateTimeOffset(DateTimeOffset.UnixEpoch.Ticks + (stored * TimeSpan.TicksPerMicrosecond), TimeSpan.Zero));
