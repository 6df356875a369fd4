using System.Text;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Canonical;
using Xunit;

namespace ModelLab.Ledger.Tests.Canonical;

public class CanonicalJsonTests
{
    private const string Section322 = """
        {
          "numbers": [333333333.33333329, 1E30, 4.50, 2e-3, 0.000000000000000000000000001],
          "string": "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\/",
          "literals": [null, true, false]
        }
        """;

    private const string Section324 =
        "7b 22 6c 69 74 65 72 61 6c 73 22 3a 5b 6e 75 6c 6c 2c 74 72 75 65 2c 66 61 6c 73 65 5d 2c 22 6e 75 6d 62 65 72 73 22 3a "
        + "5b 33 33 33 33 33 33 33 33 33 2e 33 33 33 33 33 33 33 2c 31 65 2b 33 30 2c 34 2e 35 2c 30 2e 30 30 32 2c 31 65 2d 32 37 "
        + "5d 2c 22 73 74 72 69 6e 67 22 3a 22 e2 82 ac 24 5c 75 30 30 30 66 5c 6e 41 27 42 5c 22 5c 5c 5c 5c 5c 22 2f 22 7d";

    /// <summary>RFC 8785: the value of section 3.2.2, and its bytes from section 3.2.4.</summary>
    [Fact]
    public void Sample_of_sections_3_2_2_to_3_2_4() => Assert.Equal(
        Convert.FromHexString(Section324.Replace(" ", "", StringComparison.Ordinal)),
        CanonicalJson.Serialise(JsonNode.Parse(Section322)));

    /// <summary>RFC 8785 section 3.2.3: the object whose order tells UTF-16 code units from UTF-8 bytes and from code points.</summary>
    [Fact]
    public void Sorting_sample_of_section_3_2_3()
    {
        var sorted = CanonicalJson.Serialise(JsonNode.Parse("""
            {
              "\u20ac": "Euro Sign",
              "\r": "Carriage Return",
              "\ufb33": "Hebrew Letter Dalet With Dagesh",
              "1": "One",
              "\ud83d\ude00": "Emoji: Grinning Face",
              "\u0080": "Control",
              "\u00f6": "Latin Small Letter O With Diaeresis"
            }
            """));
        string[] expected =
        [
            "Carriage Return", "One", "Control", "Latin Small Letter O With Diaeresis", "Euro Sign", "Emoji: Grinning Face",
            "Hebrew Letter Dalet With Dagesh",
        ];
        Assert.Equal(expected, CanonicalJson.Parse(sorted)!.AsObject().Select(m => m.Value!.GetValue<string>()));
    }

    /// <summary>
    /// After the test data that the authors of RFC 8785 keep beside it (the repository named in its text, folder testdata:
    /// arrays, french, structures, unicode, weird), input and output.
    /// </summary>
    [Theory]
    [InlineData("""[ 56, { "d": true, "10": null, "1": [ ] } ]""", """[56,{"1":[],"10":null,"d":true}]""")]
    [InlineData(
        """{ "peach": "This sorting order", "péché": "is wrong according to French", "pêche": "but canonicalization MUST", "sin": "ignore locale" }""",
        """{"peach":"This sorting order","péché":"is wrong according to French","pêche":"but canonicalization MUST","sin":"ignore locale"}""")]
    [InlineData(
        """{ "1": {"f": {"f": "hi","F": 5} ,"\n": 56.0}, "10": { }, "": "empty", "a": { }, "111": [ { } ], "A": { } }""",
        """{"":"empty","1":{"\n":56,"f":{"F":5,"f":"hi"}},"10":{},"111":[{}],"A":{},"a":{}}""")]
    [InlineData("""{ "Unnormalized Unicode":"\u1e0d\u0307" }""", "{\"Unnormalized Unicode\":\"\u1e0d\u0307\"}")]
    [InlineData(
        """{ "\u20ac": "Euro Sign", "1": "One", "\u0080": "Control\u007f", "\ud83d\ude02": "Smiley", "\u00f6": "Latin Small Letter O With Diaeresis", "\ufb33": "Hebrew Letter Dalet With Dagesh", "</script>": "Browser Challenge" }""",
        "{\"1\":\"One\",\"</script>\":\"Browser Challenge\",\"\u0080\":\"Control\u007f\",\"ö\":\"Latin Small Letter O With Diaeresis\",\"€\":\"Euro Sign\",\"😂\":\"Smiley\",\"\ufb33\":\"Hebrew Letter Dalet With Dagesh\"}")]
    public void Test_data_of_the_standards_authors(string input, string output)
    {
        var bytes = CanonicalJson.Serialise(JsonNode.Parse(input));
        Assert.Equal(output, Encoding.UTF8.GetString(bytes));
        Assert.Equal(bytes, CanonicalJson.Serialise(CanonicalJson.Parse(bytes)));
    }

    /// <summary>RFC 8785 section 3.2.2.2: short escapes where there are some, \u00xx in lower case for other controls, nothing else.</summary>
    [Fact]
    public void Every_ascii_character_is_escaped_as_the_standard_says_and_no_other()
    {
        for (var c = 0; c < 0x80; c++)
        {
            var expected = c switch
            {
                '"' => "\\\"",
                '\\' => "\\\\",
                8 => "\\b",
                9 => "\\t",
                10 => "\\n",
                12 => "\\f",
                13 => "\\r",
                < 0x20 => $"\\u00{c:x2}",
                _ => ((char)c).ToString(),
            };
            Assert.Equal($"\"{expected}\"", Text(JsonValue.Create(((char)c).ToString())));
        }
    }

    [Fact]
    public void Values_made_in_code_and_values_parsed_give_the_same_bytes()
    {
        var made = new JsonObject
        {
            ["int"] = 5,
            ["long"] = 9007199254740992L,
            ["byte"] = (byte)7,
            ["decimal"] = 1.50m,
            ["double"] = 1e21,
            ["minusZero"] = -0.0,
            ["char"] = 'x',
            ["guid"] = Guid.Empty,
            ["null"] = null,
            ["bools"] = new JsonArray(true, false),
        };
        const string expected =
            """{"bools":[true,false],"byte":7,"char":"x","decimal":1.5,"double":1e+21,"guid":"00000000-0000-0000-0000-000000000000","int":5,"long":9007199254740992,"minusZero":0,"null":null}""";
        Assert.Equal(expected, Text(made));
        Assert.Equal(expected, Text(JsonNode.Parse(made.ToJsonString())));
    }

    [Fact]
    public void A_record_put_in_as_a_value_is_taken_as_its_JSON()
    {
        var node = new JsonObject { ["r"] = JsonValue.Create(new { Z = 1, A = new[] { 1.5 } }) };
        Assert.Equal("""{"r":{"A":[1.5],"Z":1}}""", Text(node));
    }

    public static TheoryData<string, JsonNode?> Unrepresentable => new()
    {
        { "NaN", new JsonArray(double.NaN) },
        { "infinity", new JsonArray(double.NegativeInfinity) },
        { "single NaN", new JsonArray(float.NaN) },
        { "2^53 + 1", new JsonArray(9007199254740993L) },
        { "-(2^53 + 1)", new JsonArray(-9007199254740993L) },
        { "2^53 + 1, parsed", JsonNode.Parse("[9007199254740993]") },
        { "the largest unsigned", new JsonArray(ulong.MaxValue) },
        { "an exponent beyond doubles", JsonNode.Parse("[1e400]") },
        { "a decimal of too many digits", new JsonArray(0.1234567890123456789m) },
        { "a high half alone", new JsonArray("a\ud83d") },
        { "a low half alone", new JsonArray("\ude00b") },
        { "a half alone as char", new JsonArray(JsonValue.Create('\ud83d')) },
        { "a half alone, parsed", JsonNode.Parse("[\"\\ud83d\"]") },
        { "a half alone in a key", new JsonArray(new JsonObject { ["\ud83d"] = 1 }) },
        { "a key twice", JsonNode.Parse("[{\"a\":1,\"a\":1}]") },
        { "a key twice, once escaped", JsonNode.Parse("[{\"a\":1,\"\\u0061\":1}]") },
    };

    [Theory]
    [MemberData(nameof(Unrepresentable), DisableDiscoveryEnumeration = true)]
    public void What_cannot_be_held_without_loss_is_refused_with_its_path(string what, JsonNode? value)
    {
        var refusal = Assert.Throws<ArgumentException>(() => CanonicalJson.Serialise(new JsonObject { ["figures"] = value }));
        Assert.True(refusal.Message.StartsWith("At $.figures[0]", StringComparison.Ordinal), $"{what}: {refusal.Message}");
    }

    /// <summary>RFC 8785 appendix D: integers beyond 2^53 belong into strings. Those a double meets by its own shortest text stay.</summary>
    [Fact]
    public void Integers_that_a_double_gives_back_are_kept()
    {
        Assert.Equal("[9007199254740991]", Text(new JsonArray(9007199254740991L)));
        Assert.Equal("[295147905179352830000]", Text(JsonNode.Parse("[295147905179352830000]")));
    }

    [Fact]
    public void Values_nested_too_deep_are_refused()
    {
        Assert.Equal(2 * CanonicalJson.MaximumDepth, CanonicalJson.Serialise(Nested(CanonicalJson.MaximumDepth)).Length);
        Assert.Throws<ArgumentException>(() => CanonicalJson.Serialise(Nested(CanonicalJson.MaximumDepth + 1)));
    }

    private static JsonArray Nested(int depth)
    {
        var node = new JsonArray();
        for (var i = 1; i < depth; i++)
        {
            node = new JsonArray(node);
        }

        return node;
    }

    private static string Text(JsonNode? node) => Encoding.UTF8.GetString(CanonicalJson.Serialise(node));
}
