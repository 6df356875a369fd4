using System.Globalization;

namespace ModelLab.Ledger;

/// <summary>
/// Times as the ledger writes them: RFC 3339 in UTC with exactly six decimals and <c>Z</c>, so that they have one form
/// and sort as text, e.g. <c>2026-03-01T09:30:00.000000Z</c>.
/// </summary>
public static class LedgerTime
{
    private const string Form = "yyyy-MM-dd'T'HH:mm:ss.ffffff'Z'";

    /// <summary>Writes a time, turned to UTC; what lies below a microsecond is dropped.</summary>
    public static string Text(DateTimeOffset time) => time.UtcDateTime.ToString(Form, CultureInfo.InvariantCulture);

    /// <summary>Reads a time in exactly that form.</summary>
    /// <exception cref="FormatException">Any other form.</exception>
    public static DateTimeOffset Parse(string text) =>
        DateTimeOffset.TryParseExact(
            text, Form, CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal | DateTimeStyles.AdjustToUniversal, out var time)
            ? time
            : throw new FormatException("A time is written in UTC with six decimals, as 2026-03-01T09:30:00.000000Z.");
}
