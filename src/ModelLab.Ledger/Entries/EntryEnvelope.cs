using ModelLab.Ledger.Canonical;

namespace ModelLab.Ledger.Entries;

/// <summary>
/// What stands around an entry's body, and the order in which its canonical bytes hold it:
/// <c>at, body, by {name, personId}, kind, ledger, number, previous, reason?, sealed? {commitment, sourceId}</c>.
/// Reason and sealed part are left out where there are none, never null, so that each entry has one form.
/// </summary>
/// <param name="LedgerId">Ledger.</param>
/// <param name="Number">From 1.</param>
/// <param name="Kind">Kind and version.</param>
/// <param name="At">When.</param>
/// <param name="By">Who.</param>
/// <param name="Reason">Why, or null.</param>
/// <param name="Sealed">Sealed part, or null.</param>
/// <param name="Previous">Hash of the entry before; zero for the first.</param>
/// <param name="BodyStart">Where the body's bytes begin.</param>
/// <param name="BodyEnd">Where they end (the first byte after).</param>
internal sealed record EntryEnvelope(
    string LedgerId, long Number, string Kind, DateTimeOffset At, Author By, string? Reason,
    SealedReference? Sealed, Sha256Hash Previous, int BodyStart, int BodyEnd)
{
    /// <summary>Reads an entry's bytes, its body seen to be canonical but not built.</summary>
    /// <exception cref="FormatException">Not canonical, or no entry.</exception>
    public static EntryEnvelope Read(ReadOnlySpan<byte> bytes)
    {
        var scanner = new CanonicalScanner(bytes);
        scanner.Expect("{\"at\":"u8);
        var at = LedgerTime.Parse(scanner.String());
        scanner.Expect(",\"body\":"u8);
        var bodyStart = scanner.Position;
        scanner.Object(2);
        var bodyEnd = scanner.Position;
        scanner.Expect(",\"by\":{\"name\":"u8);
        var name = scanner.String();
        scanner.Expect(",\"personId\":"u8);
        var personId = scanner.String();
        scanner.Expect("},\"kind\":"u8);
        var kind = scanner.String();
        scanner.Expect(",\"ledger\":"u8);
        var ledgerId = scanner.String();
        scanner.Expect(",\"number\":"u8);
        var number = scanner.Number();
        scanner.Expect(",\"previous\":"u8);
        var previous = Sha256Hash.Parse(scanner.String());
        var reason = scanner.TryTake(",\"reason\":"u8) ? scanner.String() : null;
        SealedReference? part = null;
        if (scanner.TryTake(",\"sealed\":{\"commitment\":"u8))
        {
            var commitment = Sha256Hash.Parse(scanner.String());
            scanner.Expect(",\"sourceId\":"u8);
            part = new SealedReference(scanner.String(), commitment);
            scanner.Expect("}"u8);
        }

        scanner.Expect("}"u8);
        scanner.ExpectEnd();
        if (Math.Floor(number) != number || number < 1 || number > CanonicalNumber.LargestExactInteger - 1)
        {
            throw new FormatException("An entry's number is a whole number from 1.");
        }

        var envelope = new EntryEnvelope(
            ledgerId, (long)number, kind, at, new Author(personId, name), reason, part, previous, bodyStart, bodyEnd);
        return envelope.Problem() is { } problem ? throw new FormatException(problem) : envelope;
    }

    /// <summary>Writes an entry's bytes.</summary>
    /// <exception cref="ArgumentException">The body has no canonical form.</exception>
    public byte[] Write(System.Text.Json.Nodes.JsonObject body)
    {
        var writer = new CanonicalWriter();
        writer.Raw("{\"at\":"u8);
        writer.Text(LedgerTime.Text(At));
        writer.Raw(",\"body\":"u8);
        writer.Object(body, 2);
        writer.Raw(",\"by\":{\"name\":"u8);
        writer.Text(By.Name);
        writer.Raw(",\"personId\":"u8);
        writer.Text(By.PersonId);
        writer.Raw("},\"kind\":"u8);
        writer.Text(Kind);
        writer.Raw(",\"ledger\":"u8);
        writer.Text(LedgerId);
        writer.Raw(",\"number\":"u8);
        writer.Number(Number);
        writer.Raw(",\"previous\":"u8);
        writer.Text(Previous.ToString());
        if (Reason is not null)
        {
            writer.Raw(",\"reason\":"u8);
            writer.Text(Reason);
        }

        if (Sealed is not null)
        {
            writer.Raw(",\"sealed\":{\"commitment\":"u8);
            writer.Text(Sealed.Commitment.ToString());
            writer.Raw(",\"sourceId\":"u8);
            writer.Text(Sealed.SourceId);
            writer.Raw("}"u8);
        }

        writer.Raw("}"u8);
        return writer.ToArray();
    }

    /// <summary>What no entry may be like, on writing as on reading; null for nothing.</summary>
    public string? Problem()
    {
        if (!EntryKind.TryParse(Kind, out _))
        {
            return $"'{Kind}' is no kind of entry: lower-case words joined by hyphens, a slash and a version number are expected, as in data-decision/1.";
        }

        if (string.IsNullOrWhiteSpace(LedgerId))
        {
            return "An entry names its ledger.";
        }

        if (string.IsNullOrWhiteSpace(By.PersonId) || string.IsNullOrWhiteSpace(By.Name))
        {
            return "An entry names the person who acts, by id and by name.";
        }

        if (Reason is not null && string.IsNullOrWhiteSpace(Reason))
        {
            return "A reason is not blank; where an act needs none, it is left out.";
        }

        return Sealed is not null && string.IsNullOrWhiteSpace(Sealed.SourceId)
            ? "A sealed part names the source under whose key it is kept."
            : null;
    }
}
