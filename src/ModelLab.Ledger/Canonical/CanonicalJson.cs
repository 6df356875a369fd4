using System.Text.Json;
using System.Text.Json.Nodes;

namespace ModelLab.Ledger.Canonical;

/// <summary>
/// JSON in the one form that can be hashed and signed: RFC 8785 (JSON Canonicalization Scheme) over I-JSON (RFC 7493).
/// Keys in the order of their UTF-16 code units, no blanks, numbers as ECMAScript writes doubles, UTF-8 without a mark.
/// </summary>
public static class CanonicalJson
{
    /// <summary>How deep objects and arrays may stand in each other, the outermost counted.</summary>
    public const int MaximumDepth = 64;

    /// <summary>Writes a value in canonical form.</summary>
    /// <param name="node">The value; null for JSON's null.</param>
    /// <exception cref="ArgumentException">
    /// What JSON cannot hold without loss: NaN, infinity, integers beyond 2^53 that a double does not meet, decimals of
    /// more digits than a double holds, half a surrogate pair, a key twice, more than <see cref="MaximumDepth"/> deep.
    /// The message names the path.
    /// </exception>
    public static byte[] Serialise(JsonNode? node)
    {
        var writer = new CanonicalWriter();
        writer.Node(node, 0);
        return writer.ToArray();
    }

    /// <summary>Reads a value and refuses every form but the canonical one.</summary>
    /// <exception cref="CanonicalFormException">Not canonical; says at which byte, and why.</exception>
    public static JsonNode? Parse(ReadOnlySpan<byte> bytes)
    {
        Check(bytes);
        return Read(bytes);
    }

    /// <summary>Sees whether bytes are canonical, without building anything from them.</summary>
    /// <exception cref="CanonicalFormException">Not canonical; says at which byte, and why.</exception>
    public static void Check(ReadOnlySpan<byte> bytes)
    {
        var scanner = new CanonicalScanner(bytes);
        scanner.Value(0);
        scanner.ExpectEnd();
    }

    /// <summary>Reads what has been checked.</summary>
    internal static JsonNode? Read(ReadOnlySpan<byte> bytes) =>
        JsonNode.Parse(bytes, documentOptions: new JsonDocumentOptions { MaxDepth = MaximumDepth });
}
