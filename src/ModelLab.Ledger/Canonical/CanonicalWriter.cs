using System.Buffers;
using System.Globalization;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace ModelLab.Ledger.Canonical;

/// <summary>Appends JSON values in canonical form (RFC 8785) to a buffer. Faults name the path to the value.</summary>
internal sealed class CanonicalWriter
{
    private readonly ArrayBufferWriter<byte> buffer = new(1024);
    private readonly Stack<string> path = new();

    /// <summary>What was written so far.</summary>
    public byte[] ToArray() => buffer.WrittenSpan.ToArray();

    /// <summary>Text taken as it is: punctuation and known keys.</summary>
    public void Raw(ReadOnlySpan<byte> text) => buffer.Write(text);

    /// <summary>A string.</summary>
    public void Text(string text)
    {
        try
        {
            CanonicalString.Write(text, buffer);
        }
        catch (ArgumentException e)
        {
            throw Refusal(e.Message, e);
        }
    }

    /// <summary>A number.</summary>
    public void Number(double value)
    {
        if (!double.IsFinite(value))
        {
            throw Refusal("JSON has no form for NaN or infinity; record null, or a word as text");
        }

        buffer.Advance(CanonicalNumber.Write(value, buffer.GetSpan(CanonicalNumber.MaximumLength)));
    }

    /// <summary>Any value.</summary>
    /// <param name="node">The value; null for JSON's null.</param>
    /// <param name="depth">Objects and arrays around it.</param>
    public void Node(JsonNode? node, int depth)
    {
        switch (node)
        {
            case null:
                Raw("null"u8);
                break;
            case JsonObject members:
                Object(members, depth + 1);
                break;
            case JsonArray items:
                Array(items, depth + 1);
                break;
            case JsonValue value:
                Value(value, depth);
                break;
            default:
                throw Refusal($"a {node.GetType().Name} is no JSON value");
        }
    }

    /// <summary>An object, its keys in the order of their UTF-16 code units.</summary>
    /// <param name="members">The object.</param>
    /// <param name="depth">Objects and arrays around it, itself counted.</param>
    public void Object(JsonObject members, int depth)
    {
        CheckDepth(depth);
        Raw("{"u8);
        var first = true;
        foreach (var (key, value) in Sorted(members))
        {
            path.Push("." + key);
            Raw(first ? ""u8 : ","u8);
            first = false;
            Text(key);
            Raw(":"u8);
            Node(value, depth);
            path.Pop();
        }

        Raw("}"u8);
    }

    private KeyValuePair<string, JsonNode?>[] Sorted(JsonObject members)
    {
        try
        {
            return [.. members.OrderBy(m => m.Key, StringComparer.Ordinal)];
        }
        catch (Exception e) when (e is ArgumentException or InvalidOperationException)
        {
            // A parsed object is read on first use only, and shows then that a key is twice there or is no Unicode text.
            throw Refusal("a key stands twice in one object, or is not Unicode text", e);
        }
    }

    private void Array(JsonArray items, int depth)
    {
        CheckDepth(depth);
        Raw("["u8);
        for (var i = 0; i < items.Count; i++)
        {
            path.Push(string.Create(CultureInfo.InvariantCulture, $"[{i}]"));
            Raw(i == 0 ? ""u8 : ","u8);
            Node(items[i], depth);
            path.Pop();
        }

        Raw("]"u8);
    }

    private void Value(JsonValue value, int depth)
    {
        switch (value.GetValueKind())
        {
            case JsonValueKind.True:
                Raw("true"u8);
                break;
            case JsonValueKind.False:
                Raw("false"u8);
                break;
            case JsonValueKind.Null:
                Raw("null"u8);
                break;
            case JsonValueKind.String:
                Text(StringOf(value));
                break;
            case JsonValueKind.Number:
                NumberOf(value);
                break;
            default:
                // A value made from an object of the program's own: taken as the JSON it is written as.
                Node(JsonNode.Parse(value.ToJsonString()), depth);
                break;
        }
    }

    private string StringOf(JsonValue value)
    {
        if (value.TryGetValue<JsonElement>(out var element))
        {
            try
            {
                return element.GetString()!;
            }
            catch (InvalidOperationException e)
            {
                throw Refusal("text holds half of a surrogate pair or is not UTF-8", e);
            }
        }

        if (value.TryGetValue<string>(out var text))
        {
            return text;
        }

        // Dates, ids and the like have one JSON text each; a lone char could be half a pair and is taken as it is.
        return value.TryGetValue<char>(out var single)
            ? single.ToString()
            : JsonNode.Parse(value.ToJsonString())!.GetValue<string>();
    }

    private void NumberOf(JsonValue value)
    {
        if (value.TryGetValue<JsonElement>(out var element))
        {
            NumberOf(element.GetRawText());
        }
        else if (value.TryGetValue<double>(out var number))
        {
            Number(number);
        }
        else if (value.TryGetValue<float>(out var single))
        {
            Number(single);
        }
        else
        {
            // Integers of all widths and decimals: through their digits, so that none is lost unseen.
            var text = value.ToJsonString();
            NumberOf(text);
            if (value.TryGetValue<decimal>(out var exact) && !Holds(exact))
            {
                throw Refusal($"{text} has more digits than a double holds; record it as text");
            }
        }
    }

    /// <summary>
    /// A number by its text. A fraction takes the nearest double, as RFC 8785 has it; an integer that is not met
    /// exactly is refused, since beyond 2^53 such a number is an identifier or a count and must come as text.
    /// </summary>
    private void NumberOf(string text)
    {
        var value = double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture);
        if (!double.IsFinite(value))
        {
            throw Refusal($"{text} is beyond what a double holds; record it as text");
        }

        var isInteger = text.AsSpan().IndexOfAny('.', 'e', 'E') < 0;
        if (isInteger && Math.Abs(value) > CanonicalNumber.LargestExactInteger - 1 && CanonicalNumber.Text(value) != text)
        {
            throw Refusal($"the integer {text} is beyond 2^53; record it as text");
        }

        Number(value);
    }

    private static bool Holds(decimal exact) =>
        decimal.TryParse(CanonicalNumber.Text((double)exact), NumberStyles.Float, CultureInfo.InvariantCulture, out var back)
        && back == exact;

    private void CheckDepth(int depth)
    {
        if (depth > CanonicalJson.MaximumDepth)
        {
            throw Refusal($"objects and arrays stand more than {CanonicalJson.MaximumDepth} deep in each other");
        }
    }

    private ArgumentException Refusal(string problem, Exception? inner = null) =>
        new($"At ${string.Concat(path.Reverse())}: {problem.TrimEnd('.')}.", inner);
}
