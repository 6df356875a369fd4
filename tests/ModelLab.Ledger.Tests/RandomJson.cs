using System.Text.Json.Nodes;
using CsCheck;

namespace ModelLab.Ledger.Tests;

/// <summary>Random JSON values: text of all planes and of characters that need escapes, doubles of all magnitudes, nested a few deep.</summary>
internal static class RandomJson
{
    public static Gen<string> Text { get; } = Gen
        .OneOf(Gen.Int[0, 0x7f], Gen.Int[0, 0x1f], Gen.Int[0x80, 0xd7ff], Gen.Int[0xe000, 0x10ffff], Gen.Const('"' + 0), Gen.Const('\\' + 0))
        .Select(char.ConvertFromUtf32).Array[0, 6].Select(string.Concat);

    public static Gen<JsonNode?> Value { get; } = Deeper(Deeper(Deeper(Leaf())));

    public static Gen<JsonObject> Object { get; } = ObjectOf(Value);

    private static Gen<JsonNode?> Leaf() => Gen.OneOf(
        Gen.Const(0).Select(_ => (JsonNode?)null),
        Gen.Bool.Select(b => (JsonNode?)b),
        Text.Select(t => (JsonNode?)t),
        Gen.Int.Select(i => (JsonNode?)i),
        Gen.Double.Where(double.IsFinite).Select(d => (JsonNode?)d),
        Gen.Double[-1000, 1000].Select(d => (JsonNode?)d));

    private static Gen<JsonNode?> Deeper(Gen<JsonNode?> inner) => Gen.OneOf(
        inner,
        inner.Array[0, 4].Select(items => (JsonNode?)new JsonArray(items)),
        ObjectOf(inner).Select(o => (JsonNode?)o));

    private static Gen<JsonObject> ObjectOf(Gen<JsonNode?> inner) =>
        Gen.Select(Text, inner).Array[0, 5].Select(members =>
        {
            var result = new JsonObject();
            foreach (var (key, value) in members)
            {
                result[key] = value;
            }

            return result;
        });
}
